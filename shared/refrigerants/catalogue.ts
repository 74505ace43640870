import type { SourceMark } from '../verdict/types'
import type { Designation } from './designations'
import { molarMassGramsPerMole } from './molar-mass'

/** Safety class of ASHRAE 34: toxicity A or B, flammability 1, 2L, 2 or 3. */
export type SafetyClass = 'A1' | 'A2L' | 'A2' | 'A3'

/** Named sets of 100-year global warming potentials. A CO2-equivalent means nothing without the name. */
export const GWP_SETS = ['AR4', 'AR5', 'AR6'] as const
export type GwpSet = (typeof GWP_SETS)[number]

export interface Sourced<T> { value: T, source: string, mark: SourceMark }

export interface CatalogueEntry {
  designation: Designation
  safetyClass: Sourced<SafetyClass>
  molarMassGramsPerMole: number
  /** At 101.325 kPa, °C: bubble and dew point; equal for a single substance. R-744 sublimes and has none. */
  boilingPointCelsius: Sourced<{ bubble: number, dew: number }> | null
  ozoneDepletion: Sourced<number>
  /** null: the set has no value for it. A value "below 1" stands as 1 and is marked so in `gwpNote`. */
  gwp: Record<GwpSet, number | null>
  gwpNote: string | null
  /** Lower flammable limit in air at 25 °C; null for class 1. */
  lowerFlammableLimitVolumePercent: Sourced<number> | null
  transport: Sourced<{ number: string, name: string, division: '2.1' | '2.2' }>
  /** Mass percent of a blend's parts (ASHRAE 34); null for a single substance. */
  blend: Partial<Record<Designation, number>> | null
}

const PROPERTIES = 'Equations of state as evaluated by CoolProp 8.0.0'
const ASHRAE = 'ASHRAE 34'
/** Where the warming potentials come from. */
export const GWP_SOURCE = 'IPCC AR4, AR5 (without feedbacks) and AR6 WG1 table 7.SM.7, 100 years'
const TRANSPORT = '49 CFR 172.101'

interface Row {
  safety: SafetyClass
  boiling: [number, number] | null
  ozone: number
  ozoneMark?: SourceMark
  gwp: [number | null, number | null, number | null]
  gwpNote?: string
  lfl?: number
  un: string
  name: string
  division: '2.1' | '2.2'
  transportMark?: SourceMark
  safetyMark?: SourceMark
  blend?: Partial<Record<Designation, number>>
}

const ROWS: Record<Designation, Row> = {
  'R-12': { safety: 'A1', boiling: [-29.8, -29.8], ozone: 1, ozoneMark: 'verified', gwp: [10900, 10200, 12500], un: 'UN1028', name: 'Dichlorodifluoromethane or Refrigerant gas R 12', division: '2.2' },
  'R-22': { safety: 'A1', boiling: [-40.8, -40.8], ozone: 0.055, gwp: [1810, 1760, 1960], un: 'UN1018', name: 'Chlorodifluoromethane or Refrigerant gas R 22', division: '2.2' },
  'R-134a': { safety: 'A1', boiling: [-26.1, -26.1], ozone: 0, gwp: [1430, 1300, 1530], un: 'UN3159', name: '1,1,1,2-Tetrafluoroethane or Refrigerant gas R 134a', division: '2.2' },
  'R-1234yf': { safety: 'A2L', boiling: [-29.5, -29.5], ozone: 0, gwp: [4, 1, 0.501], gwpNote: 'AR4: a figure of the European Union, not of the IPCC. AR5: "below 1", taken as 1.', lfl: 6.2, un: 'UN3161', name: 'Liquefied gas, flammable, n.o.s. (2,3,3,3-tetrafluoropropene)', division: '2.1', transportMark: 'from memory' },
  'R-152a': { safety: 'A2', boiling: [-24.0, -24.0], ozone: 0, gwp: [124, 138, 164], lfl: 4.8, un: 'UN1030', name: '1,1-Difluoroethane or Refrigerant gas R 152a', division: '2.1' },
  'R-290': { safety: 'A3', boiling: [-42.1, -42.1], ozone: 0, gwp: [3, null, 0.02], gwpNote: 'AR4: a figure of the European Union, not of the IPCC. AR5: no value found.', lfl: 2.1, un: 'UN1978', name: 'Propane', division: '2.1' },
  'R-600a': { safety: 'A3', boiling: [-11.8, -11.8], ozone: 0, gwp: [3, null, null], gwpNote: 'AR4: a figure of the European Union, not of the IPCC. AR5: no value found. AR6 names none; it is below 1.', lfl: 1.8, un: 'UN1969', name: 'Isobutane', division: '2.1' },
  'R-744': { safety: 'A1', boiling: null, ozone: 0, gwp: [1, 1, 1], un: 'UN1013', name: 'Carbon dioxide', division: '2.2', transportMark: 'from memory' },
  'R-32': { safety: 'A2L', boiling: [-51.7, -51.7], ozone: 0, gwp: [675, 677, 771], lfl: 14.4, un: 'UN3252', name: 'Difluoromethane or Refrigerant gas R 32', division: '2.1' },
  'R-125': { safety: 'A1', safetyMark: 'from memory', boiling: [-48.1, -48.1], ozone: 0, gwp: [3500, 3170, 3740], un: 'UN3220', name: 'Pentafluoroethane or Refrigerant gas R 125', division: '2.2' },
  'R-143a': { safety: 'A2L', safetyMark: 'from memory', boiling: [-47.2, -47.2], ozone: 0, gwp: [4470, 4800, 5810], lfl: 8.2, un: 'UN2035', name: '1,1,1-Trifluoroethane or Refrigerant gas R 143a', division: '2.1' },
  'R-404A': { safety: 'A1', boiling: [-46.2, -45.5], ozone: 0, ozoneMark: 'verified', gwp: [null, null, null], un: 'UN3337', name: 'Refrigerant gas R 404A', division: '2.2', blend: { 'R-125': 44, 'R-143a': 52, 'R-134a': 4 } },
  'R-407C': { safety: 'A1', boiling: [-43.6, -36.6], ozone: 0, gwp: [null, null, null], un: 'UN3340', name: 'Refrigerant gas R 407C', division: '2.2', blend: { 'R-32': 23, 'R-125': 25, 'R-134a': 52 } },
  'R-410A': { safety: 'A1', boiling: [-51.4, -51.4], ozone: 0, gwp: [null, null, null], un: 'UN1078', name: 'Refrigerant gas, n.o.s. (R 410A)', division: '2.2', transportMark: 'from memory', blend: { 'R-32': 50, 'R-125': 50 } },
}

function blendGwp(blend: Partial<Record<Designation, number>>, set: number): number | null {
  let sum = 0
  for (const [part, percent] of Object.entries(blend) as [Designation, number][]) {
    const value = ROWS[part].gwp[set]
    if (value === null || value === undefined) return null
    sum += value * percent / 100
  }
  return sum
}

function entryOf(designation: Designation): CatalogueEntry {
  const row = ROWS[designation]
  const gwp = (set: number) => (row.blend ? blendGwp(row.blend, set) : row.gwp[set]!)
  return {
    designation,
    safetyClass: { value: row.safety, source: ASHRAE, mark: row.safetyMark ?? 'verified' },
    molarMassGramsPerMole: molarMassGramsPerMole(designation),
    boilingPointCelsius: row.boiling && { value: { bubble: row.boiling[0], dew: row.boiling[1] }, source: PROPERTIES, mark: 'verified' },
    ozoneDepletion: { value: row.ozone, source: 'Montreal Protocol, annexes', mark: row.ozoneMark ?? 'from memory' },
    gwp: { AR4: gwp(0), AR5: gwp(1), AR6: gwp(2) },
    gwpNote: row.gwpNote ?? (row.blend ? 'By mass fraction of its parts.' : null),
    lowerFlammableLimitVolumePercent: row.lfl === undefined ? null : { value: row.lfl, source: `${ASHRAE} and ISO 817`, mark: 'from memory' },
    transport: { value: { number: row.un, name: row.name, division: row.division }, source: TRANSPORT, mark: row.transportMark ?? 'verified' },
    blend: row.blend ?? null,
  }
}

export const CATALOGUE: Readonly<Record<Designation, CatalogueEntry>> = Object.fromEntries(
  (Object.keys(ROWS) as Designation[]).map(designation => [designation, entryOf(designation)]),
) as Record<Designation, CatalogueEntry>

/** Classes 2L, 2 and 3. */
export const isFlammableClass = (safetyClass: SafetyClass): boolean => safetyClass !== 'A1'
