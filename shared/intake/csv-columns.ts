import { SUBSTANCES, type Substance } from '../refrigerants/designations'

/**
 * How the text of a cell is read. `text` is kept exactly; the others are taken without spaces around them.
 * `percent` may carry `<` before the number and a percent sign behind it.
 */
export type CsvCellKind = 'text' | 'word' | 'number' | 'percent' | 'guard'

export interface CsvColumn {
  name: string
  kind: CsvCellKind
  /** JSON Pointer of the member that the cell becomes; a percentage becomes an entry of the list there. */
  pointer: string
  meaning: string
  unit: string | null
  /** The header must name it. */
  required: boolean
  /** Of a percentage of a part. */
  substance?: Substance
}

function column(name: string, kind: CsvCellKind, pointer: string, meaning: string, more: Partial<CsvColumn> = {}): CsvColumn {
  return { name, kind, pointer, meaning, unit: null, required: false, ...more }
}

/** `R-134a` is in `r134a_pct`, `HC` in `hc_pct`. */
export function percentColumnOf(substance: Substance): string {
  return `${substance.toLowerCase().replaceAll('-', '')}_pct`
}

/** Value of `text_guard` that says: cells of this row that a spreadsheet could run carry one apostrophe in front. */
export const TEXT_GUARD = 'apostrophe'

/** The columns of a CSV file of readings: the one list that import, export and documentation use. */
export const csvColumns: readonly CsvColumn[] = [
  column('id', 'text', '/id', 'The sender\'s own id of the reading', { required: true }),
  column('sampled_at', 'word', '/sampledAt', 'When the sample was taken, RFC 3339 with an offset', { required: true }),
  column('instrument_serial', 'text', '/instrument/serial', 'Serial number of the instrument', { required: true }),
  column('sequence', 'number', '/instrument/sequence', 'Running number of the sample on the instrument'),
  column('subject_kind', 'word', '/subject/kind', 'What was sampled: vehicle, cylinder, lot or check', { required: true }),
  column('vin', 'text', '/subject/vin', 'Vehicle: identification number'),
  column('plate', 'text', '/subject/plate', 'Vehicle: registration plate'),
  column('work_order', 'text', '/subject/workOrder', 'Vehicle: number of the work order'),
  column('port', 'word', '/subject/port', 'Vehicle: service port that was sampled, low or high'),
  column('cylinder', 'text', '/subject/tag', 'Cylinder: its tag'),
  column('lot', 'text', '/subject/number', 'Lot: its number'),
  column('check_standard', 'text', '/subject/standard', 'Check: name of the standard'),
  column('declared', 'word', '/declared', 'Refrigerant that should be in it: a designation', { required: true }),
  column('basis', 'word', '/composition/basis', 'What the percentages are shares of: mass or mole', { required: true }),
  column('air', 'word', '/composition/air', 'apart: the parts sum to 100 without air; within: together with it', { required: true }),
  column('resolution', 'number', '/composition/resolution', 'Step of the display', { unit: 'percent', required: true }),
  ...SUBSTANCES.map(substance => column(percentColumnOf(substance), 'percent', '/composition/parts', `Share of ${substance}; empty: not measured`, { unit: 'percent', substance })),
  column('air_pct', 'percent', '/composition/airPercent', 'Air; empty: not measured', { unit: 'percent' }),
  column('ambient_c', 'number', '/conditions/ambientCelsius', 'Air temperature at the instrument', { unit: 'degrees Celsius' }),
  column('pressure_kpa', 'number', '/conditions/pressureKilopascal', 'Pressure at the port', { unit: 'kilopascal' }),
  column('pressure_kind', 'word', '/conditions/pressureKind', 'gauge or absolute'),
  column('operator', 'text', '/operator', 'Who took the sample'),
  column('batch', 'text', '/batch', 'Batch that the reading belongs to'),
  column('note', 'text', '/note', 'Remark'),
  column('text_guard', 'guard', '', `"${TEXT_GUARD}": a text cell of this row that begins with = + - @ tab or CR, after any apostrophes, carries one apostrophe more in front, which is taken off`),
]

export const csvColumnsByName: ReadonlyMap<string, CsvColumn> = new Map(csvColumns.map(column => [column.name, column]))

const columnsByPointer: ReadonlyMap<string, string> = new Map([
  ...csvColumns.filter(column => column.substance === undefined && column.pointer !== '').map(column => [column.pointer, column.name] as const),
  ['/composition/airQualifier', 'air_pct'],
])

/** The column that a place in a decoded record came from; undefined where it came from several. */
export function csvColumnAt(pointer: string, record: unknown): string | undefined {
  const index = /^\/composition\/parts\/(\d+)\//.exec(pointer)?.[1]
  if (index === undefined) return columnsByPointer.get(pointer)
  const { composition } = record as { composition: { parts: { substance: Substance }[] } }
  const part = composition.parts[Number(index)]
  return part === undefined ? undefined : percentColumnOf(part.substance)
}

/** A cell that a spreadsheet would run as a formula, or that looks guarded already. */
const GUARDED = /^'*[=+\-@\t\r]/

/**
 * Puts an apostrophe before a text that a spreadsheet would run (OWASP ASVS 5.0, 1.2.10), and before
 * one that looks as if it had been guarded, so that `unguardText` is its exact inverse.
 */
export function guardText(text: string): string {
  return GUARDED.test(text) ? `'${text}` : text
}

export function unguardText(text: string): string {
  return text.startsWith('\'') && GUARDED.test(text) ? text.slice(1) : text
}
