import type { PressureCheck, PressureOutcome } from './check'

const kilopascal = (value: number): string => `${Math.round(value)} kPa`
const percent = (fraction: number): string => `${(fraction * 100).toFixed(1)} %`

const TITLES: Record<PressureOutcome, string> = {
  'none': 'As expected',
  'inside-uncertainty': 'Too close to call',
  'air': 'More pressure than the refrigerant explains: air',
  'contamination-explains': 'The contamination explains the pressure',
  'no-liquid': 'No liquid: low charge',
  'unidentified': 'No pressure can be expected of this',
  'out-of-range': 'Outside the range of the formulas',
}

/** What the pressure says, for the technician. */
export function explainPressure(check: PressureCheck): { title: string, finding: string } {
  const title = TITLES[check.outcome]
  if (check.outcome === 'unidentified') return { title, finding: 'Part of the sample was not identified, or is a refrigerant without a known saturation line; the pressure says nothing about air.' }
  if (check.expectedKilopascalAbsolute === null || check.excessKilopascal === null) return { title, finding: 'At this temperature the pressure of the sample is not known well enough; nothing is extrapolated.' }
  const numbers = `Measured ${kilopascal(check.measuredKilopascalAbsolute)} absolute, expected ${kilopascal(check.expectedKilopascalAbsolute)}${check.lowerEstimate ? ' at least' : ''} (U = ${kilopascal(check.expandedUncertaintyKilopascal!)}).`
  switch (check.outcome) {
    case 'air': return { title, finding: `${numbers} As air that is ${check.lowerEstimate ? 'at most ' : ''}${percent(check.airMoleFractionIdeal!)} by mole of the vapour (ideal gas)${check.airMoleFractionRealVapour === null ? '' : `, ${percent(check.airMoleFractionRealVapour)} against the real vapour`}.` }
    case 'contamination-explains': return { title, finding: `${numbers} The declared refrigerant alone would show ${kilopascal(check.declaredKilopascalAbsolute!)}; the other refrigerants found make up the difference, so it is no sign of air.` }
    case 'no-liquid': return { title, finding: `${numbers} So low a pressure means that there is gas only: little charge is left, and the sample may not stand for the whole.` }
    case 'inside-uncertainty': return { title, finding: check.lowerEstimate ? `${numbers} How these refrigerants act on each other is not published, so the excess may be theirs; nothing is said about air.` : `${numbers} The excess lies inside the uncertainty; nothing is said about air.` }
    default: return { title, finding: numbers }
  }
}
