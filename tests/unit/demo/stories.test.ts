import { describe, expect, it } from 'vitest'
import { mean } from '#shared/statistics/describe'
import { straightLine } from '#shared/statistics/regression'
import { normaliseComposition } from '#shared/composition/normalise'
import { decideVerdict } from '#shared/verdict/decide'
import { defaultLimitSet } from '#shared/verdict/limits'
import type { PurityReading } from '#shared/intake/reading-schema'
import type { Substance } from '#shared/refrigerants/designations'
import { declaredPercent } from '#fixtures/demo/measure'
import { demoScenario } from '#fixtures/demo/scenario'
import type { DemoReading } from '#fixtures/demo/types'

const DAY = 86_400_000

const percentOf = ({ composition }: PurityReading, substance: Substance): number => {
  const part = composition.parts.find(part => part.substance === substance)
  return part === undefined || part.qualifier === '<' ? 0 : part.percent
}

describe.each([[20260101, '2026-12-01T17:40:00Z'], [20260101, '2026-08-02T14:05:00Z'], [11, '2027-02-17T20:00:00Z'], [5, '2026-05-20T15:00:00Z']])('the stories of seed %d at %s', (seed, text) => {
  const now = new Date(text)
  const scenario = demoScenario({ seed, now })
  const { stories, organisation } = scenario
  const age = ({ sampledAt }: DemoReading) => (now.getTime() - sampledAt.getTime()) / DAY
  const meanOf = (values: number[]): number => mean(values)!

  it('1: a minibus with R-22 spoils the tank of a machine, and vehicles after it, until the tank is found out', () => {
    const { vin, workOrder, cylinder, from, until, shop } = stories.crossContamination
    const minibus = organisation.readings.find(({ reading }) => reading.subject.kind === 'vehicle' && reading.subject.workOrder === workOrder)!
    expect(minibus.reading.declared).toBe('R-134a')
    expect(percentOf(minibus.reading, 'R-22')).toBeGreaterThan(30)
    const recovered = organisation.movements.find(movement => movement.workOrder === workOrder && movement.from.kind === 'vehicle')!
    expect(recovered).toMatchObject({ from: { kind: 'vehicle', vin }, to: { kind: 'cylinder', tag: cylinder } })

    const vehicles = organisation.readings.filter(reading => reading.shop === shop && reading.reading.subject.kind === 'vehicle' && reading.reading.declared === 'R-134a')
    const shareWithR22 = (start: number, end: number) => {
      const group = vehicles.filter(({ sampledAt }) => sampledAt.getTime() > start && sampledAt.getTime() <= end)
      return group.filter(({ reading }) => percentOf(reading, 'R-22') >= 1).length / group.length
    }
    const during = shareWithR22(from.getTime() + DAY, until.getTime())
    const before = shareWithR22(from.getTime() - 90 * DAY, from.getTime())
    expect(during).toBeGreaterThan(0.15)
    expect(during).toBeGreaterThan(3 * before)
    // Thinned by every clean vehicle.
    const charged = new Set(organisation.movements.filter(({ from: source, at }) => source.kind === 'cylinder' && source.tag === cylinder && at > from && at < until).map(({ workOrder }) => workOrder))
    expect(charged.size).toBeGreaterThan(8)
    const samples = organisation.readings.filter(({ reading }) => reading.subject.kind === 'cylinder' && reading.subject.tag === cylinder)
    expect(samples.filter(({ sampledAt }) => sampledAt > from && sampledAt.getTime() < until.getTime() - DAY)).toHaveLength(0)
    const found = samples.filter(({ sampledAt }) => Math.abs(sampledAt.getTime() - until.getTime()) < DAY)
    expect(found.length).toBeGreaterThanOrEqual(2)
    for (const { reading } of found) expect(percentOf(reading, 'R-22')).toBeGreaterThan(0.8)
    expect(organisation.cylinders.find(({ tag }) => tag === cylinder)!.contentsGrams).toBe(0)
  })

  it('2: one instrument drifts from its check standard, and no other does', () => {
    const { standard, instrument, from } = stories.drift
    const assigned = organisation.checkStandards.find(({ name }) => name === standard)!.assigned['R-134a']!
    for (const { serial, resolution } of organisation.instruments) {
      const checks = organisation.readings.filter(({ reading, sampledAt }) => reading.instrument.serial === serial && reading.subject.kind === 'check' && reading.subject.standard === standard && sampledAt > from)
      expect(checks.length).toBeGreaterThan(13)
      const line = straightLine(checks.map(check => -age(check)), checks.map(({ reading }) => declaredPercent(reading.composition, 'R-134a') - assigned))
      const overFourMonths = line.slope! * 120
      if (serial === instrument) expect(overFourMonths).toBeLessThan(-0.6)
      else if (resolution < 1) expect(Math.abs(overFourMonths)).toBeLessThan(0.35)
    }
    const purity = (fromDays: number, toDays: number) => meanOf(organisation.readings
      .filter(reading => reading.reading.instrument.serial === instrument && reading.reading.subject.kind === 'vehicle' && age(reading) < fromDays && age(reading) > toDays)
      .map(({ reading }) => declaredPercent(reading.composition, reading.declared)).filter(percent => percent > 97))
    expect(purity(30, 0)).toBeLessThan(purity(300, 130) - 0.4)
  })

  it('3: one lot of one supplier falls short, and was in use before it was sampled', () => {
    const { lot, supplier, sampledFrom } = stories.poorLot
    const purityOf = (number: string) => meanOf(organisation.readings.filter(({ reading }) => reading.subject.kind === 'lot' && reading.subject.number === number).map(({ reading }) => declaredPercent(reading.composition, reading.declared)))
    for (const { number } of organisation.lots) {
      if (number === lot) expect(purityOf(number)).toBeLessThan(97.3)
      else expect(purityOf(number)).toBeGreaterThan(99)
    }
    const record = organisation.lots.find(({ number }) => number === lot)!
    expect(record.supplier).toBe(supplier)
    expect(organisation.lots.filter(other => other.supplier === supplier).length).toBeGreaterThan(1)
    const used = organisation.movements.filter(({ from }) => from.kind === 'cylinder' && record.cylinders.includes(from.tag))
    expect(used.every(({ at }) => at < sampledFrom)).toBe(true)
  })

  it('4: one charge holds hydrocarbons, and is kept apart', () => {
    const { vin, workOrder, sampledAt } = stories.flammable
    const flammable = organisation.readings.filter(({ reading }) => reading.subject.kind === 'vehicle' && percentOf(reading, 'HC') >= 2)
    expect(flammable.length).toBeGreaterThanOrEqual(2)
    for (const { reading } of flammable) {
      expect(reading.subject).toMatchObject({ workOrder })
      if (reading.subject.kind === 'vehicle' && reading.subject.vin !== undefined) expect(reading.subject.vin).toBe(vin)
    }
    expect(percentOf(flammable[0]!.reading, 'HC')).toBeGreaterThan(4.5)
    expect((now.getTime() - sampledAt.getTime()) / DAY).toBeLessThan(7)
    expect(organisation.movements.filter(movement => movement.workOrder === workOrder && movement.from.kind === 'vehicle').map(({ to }) => to)).toEqual([{ kind: 'cylinder', tag: 'FX-1' }])
  })

  it('5: air creeps up at one shop, and at no other', () => {
    const air = (shop: string, fromDays: number, toDays: number) => meanOf(organisation.readings
      .filter(reading => reading.shop === shop && reading.reading.subject.kind === 'vehicle' && reading.reading.composition.basis === 'mass' && reading.reading.composition.airPercent !== undefined && age(reading) < fromDays && age(reading) > toDays)
      .map(({ reading }) => reading.composition.airQualifier === '<' ? 0.1 : reading.composition.airPercent!))
    for (const { name } of organisation.shops) {
      const before = air(name, 500, 250)
      const halfway = air(name, 150, 100)
      const lately = air(name, 30, 0)
      if (name === stories.airCreep.shop) {
        expect(halfway).toBeGreaterThan(before + 0.5)
        expect(lately).toBeGreaterThan(halfway + 0.4)
      } else expect(Math.abs(lately - before)).toBeLessThan(0.25)
    }
  })

  it('6: a device sends the backlog of a day at once, in one unbroken sequence', () => {
    const { instrument, date, receivedAt } = stories.backlog
    const day = organisation.readings.filter(({ reading }) => reading.instrument.serial === instrument && reading.sampledAt.startsWith(date))
    const sent = [...scenario.submissions()].filter(submission => submission.receivedAt.getTime() === receivedAt.getTime() && submission.instrumentSerial === instrument)
    expect(day.length).toBeGreaterThanOrEqual(5)
    expect(sent).toHaveLength(1)
    const lines = new TextDecoder().decode(sent[0]!.bytes).trimEnd().split('\n').map(line => JSON.parse(line) as PurityReading)
    expect(lines).toEqual(day.map(({ reading }) => reading))
    lines.forEach(({ instrument: { sequence }, sampledAt }, i) => {
      expect(sequence).toBe(lines[0]!.instrument.sequence! + i)
      expect(receivedAt.getTime() - Date.parse(sampledAt)).toBeGreaterThan(10 * 3_600_000)
    })
  })

  it('7: this morning holds each of the five next steps, and one vehicle waits for a second sample', () => {
    const uncertainties = new Map(organisation.instruments.map(({ serial, uncertainty }) => [serial, uncertainty]))
    const stepOf = ({ declared, composition, instrument: { serial } }: PurityReading) => decideVerdict({
      declared, composition: normaliseComposition(composition), resolutionPercent: composition.resolution, uncertainty: uncertainties.get(serial)!, limits: defaultLimitSet(), earlier: [],
      validity: { calibrationOverdue: false, filterSpent: false, ambientCelsius: 20, ambientMinimumCelsius: 10, ambientMaximumCelsius: 49, instrumentOutOfControl: false },
    }).kind
    const today = organisation.readings.filter(reading => age(reading) < 0.5)
    expect(today.length).toBeGreaterThanOrEqual(10)
    expect(today.length).toBeLessThanOrEqual(30)
    const stepsOf = (workOrder: string) => today.filter(({ reading: { subject } }) => subject.kind === 'vehicle' && subject.workOrder === workOrder).map(({ reading }) => stepOf(reading))
    expect(stepsOf(stories.today.wrongGas)).toEqual(['isolate'])
    expect(stepsOf(stories.today.muchAir)).toEqual(['connect-purge-air'])
    expect(stepsOf(stories.today.tooClose)).toEqual(['sample-again'])
    expect(stepsOf(stories.flammable.workOrder)[0]).toBe('isolate-flammable')
    expect(today.filter(({ reading }) => stepOf(reading) === 'connect').length).toBeGreaterThanOrEqual(3)
  })
})
