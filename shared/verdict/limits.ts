import type { Limit, LimitSet, RefrigerantLimits } from './types'

const J2099 = 'SAE J2099-2012: purity as identified before on-site recycling of R-134a and R-1234yf, as summarised by a testing laboratory'
const PRACTICE = 'Workshop practice'

function byMassAirFree(value: number, source: string, mark: Limit['mark']): Limit {
  return { value, unit: 'percent by mass, air-free', source, mark }
}

function ofSample(value: number, source: string, mark: Limit['mark']): Limit {
  return { value, unit: 'percent by mass of the sample', source, mark }
}

const DEFAULT: RefrigerantLimits = {
  purityMinimum: byMassAirFree(98, J2099, 'verified'),
  // What 98 % purity leaves for everything else together.
  foreignMaximum: byMassAirFree(2, J2099, 'verified'),
  flammableMaximum: byMassAirFree(2, `${PRACTICE}: from about 2 % hydrocarbons the whole charge is treated as flammable`, 'common practice, no source'),
  unknownMaximum: byMassAirFree(2, `${PRACTICE}: what can't be identified is treated as foreign and as possibly flammable`, 'common practice, no source'),
  airCaution: ofSample(2, `${PRACTICE}: about 2 % air costs a little performance`, 'common practice, no source'),
  airAction: ofSample(3, `${PRACTICE}: several percent of air raise head pressure and heat; a recycling machine purges it`, 'common practice, no source'),
}

/** For refrigerants that the standard does not name, the same figure is a habit, not a rule. */
const OTHER_REFRIGERANT: RefrigerantLimits = {
  ...DEFAULT,
  purityMinimum: byMassAirFree(98, `${PRACTICE}: the figure of SAE J2099 carried over to a refrigerant that it does not cover`, 'common practice, no source'),
  foreignMaximum: byMassAirFree(2, `${PRACTICE}: the figure of SAE J2099 carried over to a refrigerant that it does not cover`, 'common practice, no source'),
}

/** The limits that an organisation starts with: version 1, guarded by one expanded uncertainty. Made anew at each call. */
export function defaultLimitSet(): LimitSet {
  return structuredClone({
    version: 1,
    name: 'Published defaults',
    effectiveFrom: '2020-01-01T00:00:00.000Z',
    note: 'From public standards and workshop practice; may be out of date, and may be replaced by the vehicle maker\'s or the local authority\'s.',
    decision: { kind: 'guarded', guardFactor: 1 },
    limits: { 'default': OTHER_REFRIGERANT, 'R-134a': DEFAULT, 'R-1234yf': DEFAULT },
  } satisfies LimitSet)
}
