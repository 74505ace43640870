import { z } from 'zod'
import { DESIGNATIONS, SUBSTANCES } from '../refrigerants/designations'
import type { RefusalCode } from './refusal'
import { SAMPLING_TIME_PATTERN, faultOfSamplingTime } from './sampling-time'

/** Name of the schema, sent with every JSON reading. */
export const READING_SCHEMA = 'purity-reading/1'

/** Ranges that the schema checks and the documentation prints. */
export const READING_RANGES = {
  percent: { minimum: 0, maximum: 100 },
  resolution: { above: 0, maximum: 10 },
  sequence: { minimum: 0, maximum: Number.MAX_SAFE_INTEGER },
  /** Beyond any bay where an instrument works; catches Fahrenheit sent as Celsius. */
  ambientCelsius: { minimum: -60, maximum: 90 },
  /** From full vacuum (below the standard atmosphere by the spread of weather) to above the high side of R-744. */
  pressureKilopascal: { minimum: -110, maximum: 20_000 },
  id: { maximumLength: 100 },
  text: { maximumLength: 100 },
  note: { maximumLength: 2_000 },
} as const

/** With the `u` flag only a half that stands alone matches. */
const BAD_CHARACTER = /[\u0000\ud800-\udfff]/u

/** What a refinement hands to `validateRecord` through zod's issue. */
export interface RefinementParams {
  refusal: RefusalCode
  reason?: string
}

function refuseAs(refusal: RefusalCode, reason?: string): { params: RefinementParams } {
  return { params: reason === undefined ? { refusal } : { refusal, reason } }
}

function keepable<Schema extends z.ZodType<string>>(schema: Schema): Schema {
  return schema.refine(text => !BAD_CHARACTER.test(text), refuseAs('bad-character'))
}

/** Text that may be empty. */
function freeText(maximumLength: number, description: string) {
  return keepable(z.string().max(maximumLength)).describe(description)
}

/** Text that names something: not empty, not only spaces, kept exactly as sent. */
function namingText(maximumLength: number, description: string) {
  return keepable(z.string().min(1).max(maximumLength).regex(/\S/)).describe(description)
}

/** −0 is stored as 0: the two compare equal, but print and hash differently. */
function withoutNegativeZero(value: number): number {
  return value === 0 ? 0 : value
}

function percent(description: string) {
  return z.number().min(READING_RANGES.percent.minimum).max(READING_RANGES.percent.maximum)
    .overwrite(withoutNegativeZero)
    .describe(description)
}

const name = READING_RANGES.text.maximumLength
const belowDetection = '"<": below detection; the number is then the detection limit.'

const vehicle = z.strictObject({
  kind: z.literal('vehicle'),
  vin: namingText(name, 'Vehicle identification number. A check digit that does not fit is flagged, not refused.').optional(),
  plate: namingText(name, 'Registration plate.').optional(),
  workOrder: namingText(name, 'Number of the work order.').optional(),
  port: z.enum(['low', 'high']).describe('Service port that was sampled.').optional(),
}).refine(
  subject => subject.vin !== undefined || subject.plate !== undefined || subject.workOrder !== undefined,
  refuseAs('subject'),
)

const cylinder = z.strictObject({
  kind: z.literal('cylinder'),
  tag: namingText(name, 'Tag of the cylinder.'),
})

const lot = z.strictObject({
  kind: z.literal('lot'),
  number: namingText(name, 'Number of the supply lot.'),
})

const check = z.strictObject({
  kind: z.literal('check'),
  standard: namingText(name, 'Name of the check standard.'),
})

const part = z.strictObject({
  substance: z.enum(SUBSTANCES).describe('Designation (ASHRAE 34) from the catalogue, or HC (hydrocarbons not told apart), or OTHER (not identified).'),
  percent: percent('Share in percent, on the basis of the composition.'),
  qualifier: z.literal('<').describe(belowDetection).optional(),
})

const composition = z.strictObject({
  basis: z.enum(['mass', 'mole']).describe('What the percentages are shares of: mass, or amount of substance (volume of an ideal gas is mole).'),
  air: z.enum(['apart', 'within']).describe('apart: the parts sum to 100 without air. within: they sum to 100 together with air.'),
  resolution: z.number().gt(READING_RANGES.resolution.above).max(READING_RANGES.resolution.maximum).describe('Step of the display in percent, for example 0.1.'),
  parts: z.array(part).min(1).max(SUBSTANCES.length)
    .superRefine((parts, context) => {
      for (let index = 1; index < parts.length; index++) {
        const { substance } = parts[index]!
        if (parts.findIndex(other => other.substance === substance) < index) {
          context.addIssue({ code: 'custom', path: [index, 'substance'], ...refuseAs('duplicate-substance', `${substance} stands twice in the composition.`) })
        }
      }
    })
    .describe('What the instrument reported, each substance once.'),
  airPercent: percent('Air in percent; leave it out where air was not measured.').optional(),
  airQualifier: z.literal('<').describe(belowDetection).optional(),
}).superRefine((composition, context) => {
  if (composition.airQualifier !== undefined && composition.airPercent === undefined) {
    context.addIssue({ code: 'custom', path: ['airPercent'], ...refuseAs('missing', 'airQualifier stands without airPercent.') })
  }
})

const conditions = z.strictObject({
  ambientCelsius: z.number().min(READING_RANGES.ambientCelsius.minimum).max(READING_RANGES.ambientCelsius.maximum)
    .overwrite(withoutNegativeZero)
    .describe('Air temperature at the instrument, in degrees Celsius.').optional(),
  pressureKilopascal: z.number().min(READING_RANGES.pressureKilopascal.minimum).max(READING_RANGES.pressureKilopascal.maximum)
    .overwrite(withoutNegativeZero)
    .describe('Pressure at the port, in kilopascal; needs pressureKind. An absolute pressure is not below 0.').optional(),
  pressureKind: z.enum(['gauge', 'absolute']).describe('gauge: above the surrounding air. absolute: above vacuum.').optional(),
}).superRefine((conditions, context) => {
  const { pressureKilopascal, pressureKind } = conditions
  if ((pressureKilopascal === undefined) !== (pressureKind === undefined)) {
    context.addIssue({ code: 'custom', path: [pressureKind === undefined ? 'pressureKind' : 'pressureKilopascal'], ...refuseAs('pressure') })
  }
  if (pressureKind === 'absolute' && pressureKilopascal !== undefined && pressureKilopascal < 0) {
    context.addIssue({ code: 'custom', path: ['pressureKilopascal'], ...refuseAs('range', 'An absolute pressure is not below 0.') })
  }
})

/**
 * One sampled composition as it is sent: the single definition that validation, the type, the JSON
 * Schema, the OpenAPI document, the CSV columns and the documentation are drawn from.
 * Texts are kept exactly as sent; members that are not named here are refused.
 */
export const purityReading = z.strictObject({
  schema: z.literal(READING_SCHEMA),
  id: namingText(READING_RANGES.id.maximumLength, 'The sender\'s own id of the reading, unique for the sender. Sent again with the same content it changes nothing; with other content it is a conflict.'),
  sampledAt: z.string().regex(SAMPLING_TIME_PATTERN)
    .superRefine((text, context) => {
      const fault = faultOfSamplingTime(text)
      if (fault !== undefined) context.addIssue({ code: 'custom', ...refuseAs('time', fault) })
    })
    .meta({ format: 'date-time' })
    .describe('When the sample was taken: RFC 3339 with an offset.'),
  instrument: z.strictObject({
    serial: namingText(name, 'Serial number of the instrument.'),
    sequence: z.int().min(READING_RANGES.sequence.minimum).max(READING_RANGES.sequence.maximum)
      .overwrite(withoutNegativeZero)
      .describe('Running number of the sample on the instrument.').optional(),
  }).describe('The instrument that measured.'),
  subject: z.discriminatedUnion('kind', [vehicle, cylinder, lot, check]).describe('What was sampled.'),
  declared: z.enum(DESIGNATIONS).describe('Refrigerant that should be in it, by label or papers: a designation, not a group.'),
  composition: composition.describe('The composition as the instrument showed it.'),
  conditions: conditions.describe('The surroundings of the measurement.').optional(),
  operator: freeText(name, 'Who took the sample, as the sender names people.').optional(),
  batch: freeText(name, 'Name of the batch that the reading belongs to.').optional(),
  note: freeText(READING_RANGES.note.maximumLength, 'Remark.').optional(),
})

export type PurityReading = z.infer<typeof purityReading>
