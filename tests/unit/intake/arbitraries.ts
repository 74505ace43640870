import fc from 'fast-check'
import { DESIGNATIONS, SUBSTANCES } from '#shared/refrigerants/designations'
import type { PurityReading } from '#shared/intake/reading-schema'

/** Text with the characters that break files, without those that can't be kept. */
function text(minLength: number, maxLength: number): fc.Arbitrary<string> {
  const troublesome = fc.constantFrom(...'=+-@\t\r\n"\',;<% \u00A0éß漢\u{1F698}\uFEFFaZ0')
  return fc.string({ unit: fc.oneof(troublesome, fc.string({ minLength: 1, maxLength: 1, unit: 'grapheme' })), minLength, maxLength: 12 })
    .map(value => value.replaceAll('\u0000', '').slice(0, maxLength))
    .filter(value => value.length >= minLength && !/[\ud800-\udfff]/u.test(value))
}

const naming = text(1, 12).filter(value => /\S/.test(value))
const optional = <Value>(arbitrary: fc.Arbitrary<Value>): fc.Arbitrary<Value | undefined> => fc.option(arbitrary, { nil: undefined })

const subject = fc.oneof(
  fc.record({ kind: fc.constant('vehicle' as const), vin: optional(naming), plate: naming, workOrder: optional(naming), port: optional(fc.constantFrom('low' as const, 'high' as const)) }),
  fc.record({ kind: fc.constant('cylinder' as const), tag: naming }),
  fc.record({ kind: fc.constant('lot' as const), number: naming }),
  fc.record({ kind: fc.constant('check' as const), standard: naming }),
)

/** Percentages to a tenth that add up to 100, with air where it counts. */
const composition = fc.record({
  basis: fc.constantFrom('mass' as const, 'mole' as const),
  air: fc.constantFrom('apart' as const, 'within' as const),
  substances: fc.shuffledSubarray([...SUBSTANCES], { minLength: 1, maxLength: 6 }),
  cuts: fc.array(fc.integer({ min: 0, max: 1_000 }), { minLength: 6, maxLength: 6 }),
  airTenths: optional(fc.integer({ min: 0, max: 500 })),
  airBelow: fc.boolean(),
}).map(({ basis, air, substances, cuts, airTenths, airBelow }): PurityReading['composition'] => {
  const whole = air === 'within' ? 1_000 - (airTenths ?? 0) : 1_000
  const places = [0, ...cuts.slice(0, substances.length - 1).map(cut => cut % (whole + 1)).sort((a, b) => a - b), whole]
  const parts = substances.map((substance, index) => ({ substance, percent: (places[index + 1]! - places[index]!) / 10 }))
  const measured = airTenths === undefined ? {} : { airPercent: airTenths / 10 }
  return { basis, air, resolution: 0.1, parts, ...measured, ...(airBelow && airTenths !== undefined && air === 'apart' ? { airQualifier: '<' as const } : {}) }
})

const conditions = fc.oneof(
  fc.record({ ambientCelsius: fc.double({ min: -60, max: 90, noNaN: true }) }),
  fc.record({ pressureKilopascal: fc.double({ min: 0, max: 20_000, noNaN: true }), pressureKind: fc.constantFrom('gauge' as const, 'absolute' as const) }),
)

const sampledAt = fc.record({
  moment: fc.integer({ min: Date.UTC(2000, 0, 2), max: Date.UTC(2099, 11, 30) }),
  fraction: fc.constantFrom('', '.5', '.123456', '.100'),
  offset: fc.constantFrom('Z', '+05:45', '-12:00', '+00:00'),
}).map(({ moment, fraction, offset }) => `${new Date(moment).toISOString().slice(0, 19)}${fraction}${offset}`)

/** Any reading that is taken. */
export const anyReading: fc.Arbitrary<PurityReading> = fc.record({
  schema: fc.constant('purity-reading/1' as const),
  id: naming,
  sampledAt,
  instrument: fc.record({ serial: naming, sequence: optional(fc.maxSafeNat()) }),
  subject,
  declared: fc.constantFrom(...DESIGNATIONS),
  composition,
  conditions: optional(conditions),
  operator: optional(text(1, 12)),
  batch: optional(text(1, 12)),
  note: optional(text(1, 40)),
}).map(reading => JSON.parse(JSON.stringify(reading)) as PurityReading)
