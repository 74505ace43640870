import { SUBSTANCES } from '../refrigerants/designations'
import type { PurityReading } from './reading-schema'
import { momentOf } from './sampling-time'

const order: ReadonlyMap<string, number> = new Map(SUBSTANCES.map((substance, index) => [substance, index]))

/**
 * What a reading says, as canonical JSON (RFC 8785): the input of its content digest. Two readings with
 * equal text here are the same reading sent twice. Order of members and of parts, an empty text in place
 * of none, and the offset in which the moment is written make no difference; the form of the submission
 * (JSON, NDJSON, CSV) makes none either.
 *
 * RFC 8785 is what `JSON.stringify` writes once the members stand in order of their names, so they are
 * written down here in that order: several times faster than sorting, and a test holds it against a
 * package that sorts.
 */
export function canonicalReading(reading: PurityReading): string {
  const { composition, conditions, instrument } = reading
  const subject: SubjectMembers = reading.subject
  return JSON.stringify({
    batch: reading.batch || undefined,
    composition: {
      air: composition.air,
      airPercent: composition.airPercent,
      airQualifier: composition.airQualifier,
      basis: composition.basis,
      parts: composition.parts
        .map(({ percent, qualifier, substance }) => ({ percent, qualifier, substance }))
        .sort((a, b) => order.get(a.substance)! - order.get(b.substance)!),
      resolution: composition.resolution,
    },
    conditions: isEmpty(conditions) ? undefined : {
      ambientCelsius: conditions.ambientCelsius,
      pressureKilopascal: conditions.pressureKilopascal,
      pressureKind: conditions.pressureKind,
    },
    declared: reading.declared,
    id: reading.id,
    instrument: { sequence: instrument.sequence, serial: instrument.serial },
    note: reading.note || undefined,
    operator: reading.operator || undefined,
    sampledAt: momentOf(reading.sampledAt),
    schema: reading.schema,
    subject: {
      kind: subject.kind,
      number: subject.number,
      plate: subject.plate,
      port: subject.port,
      standard: subject.standard,
      tag: subject.tag,
      vin: subject.vin,
      workOrder: subject.workOrder,
    },
  })
}

/** The members of every kind of subject; each reading has those of its own kind. */
type SubjectMembers = { kind: string } & { [Name in Exclude<keyof UnionToIntersection<PurityReading['subject']>, 'kind'>]?: string }
type UnionToIntersection<Union> = (Union extends unknown ? (member: Omit<Union, 'kind'>) => void : never) extends (member: infer Whole) => void ? Whole : never

function isEmpty(conditions: PurityReading['conditions']): conditions is undefined {
  return conditions === undefined || (conditions.ambientCelsius === undefined && conditions.pressureKilopascal === undefined && conditions.pressureKind === undefined)
}
