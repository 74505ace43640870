import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { checkSum } from '#shared/composition/sum'
import { validateRecord } from '#shared/intake/validate-record'
import { MAKES } from '#fixtures/demo/fleet'
import { declaredPercent } from '#fixtures/demo/measure'
import { demoScenario } from '#fixtures/demo/scenario'
import type { DemoScenario } from '#fixtures/demo/types'

const NOW = new Date('2026-12-01T17:40:00Z')
const scenario = demoScenario({ now: NOW })
const { organisation } = scenario

function digest(given: DemoScenario): string {
  const hash = createHash('sha256')
  for (const { bytes, receivedAt, sender } of given.submissions()) hash.update(`${sender} ${receivedAt.toISOString()} `).update(bytes)
  return hash.update(JSON.stringify([given.organisation, given.otherOrganisation, given.stories])).digest('hex')
}

/** The weighted sum of 49 CFR 565.15(c), written apart from the generator's. */
function checkDigitOf(vin: string): string {
  const values = [...vin].map((character) => {
    if (/\d/.test(character)) return Number(character)
    return ' ABCDEFGH'.indexOf(character) > 0 ? ' ABCDEFGH'.indexOf(character) : ' JKLMN P R'.indexOf(character) > 0 ? ' JKLMN P R'.indexOf(character) : '  STUVWXYZ'.indexOf(character)
  })
  const weights = [8, 7, 6, 5, 4, 3, 2, 10, 0, 9, 8, 7, 6, 5, 4, 3, 2]
  return '0123456789X'[values.reduce((sum, value, i) => sum + value * weights[i]!, 0) % 11]!
}

describe('the demo scenario', { timeout: 30_000 }, () => {
  it('gives the same bytes for the same seed and time, and others for another seed', () => {
    const first = digest(scenario)
    expect(digest(demoScenario({ now: new Date(NOW) }))).toBe(first)
    expect(digest(demoScenario({ now: NOW, seed: 7 }))).not.toBe(first)
    expect(digest(scenario)).toBe(first)
  })

  it.each(['2026-12-01T17:40:00Z', '2026-03-08T07:30:00Z', '2025-07-06T23:00:00Z', '2026-11-01T06:20:00Z', '2027-01-01T05:10:00Z', '2026-12-07T03:00:00Z'])('has about 8,000 readings of two years that end at %s', (text) => {
    const now = new Date(text)
    const given = demoScenario({ now })
    const { readings } = given.organisation
    expect(readings.length).toBeGreaterThan(7_400)
    expect(readings.length).toBeLessThan(8_600)
    expect(given.organisation.vehicles.length).toBeGreaterThan(1_700)
    expect(given.organisation.vehicles.length).toBeLessThan(2_150)
    const times = readings.map(({ sampledAt }) => sampledAt.getTime())
    expect(times).toEqual([...times].sort((a, b) => a - b))
    expect(times[0]!).toBeGreaterThan(given.since.getTime())
    // From this morning on: within a working day of now, and not ahead of it.
    expect(times.at(-1)!).toBeLessThan(now.getTime())
    expect(times.at(-1)!).toBeGreaterThan(now.getTime() - 10 * 3_600_000)
  })

  it('has only readings that intake takes, with sums that agree', () => {
    for (const { reading, sampledAt } of [...organisation.readings, ...scenario.otherOrganisation.readings]) {
      expect(validateRecord(reading)).toEqual({ ok: true, reading })
      expect(checkSum(reading.composition).outcome).toBe('agrees')
      expect(Date.parse(reading.sampledAt)).toBe(sampledAt.getTime() - sampledAt.getTime() % 1000)
    }
  })

  it('counts each instrument without a break but for the gaps that it tells of', () => {
    const missing = new Map<string, number>()
    for (const { serial } of organisation.instruments) {
      const own = organisation.readings.filter(({ reading }) => reading.instrument.serial === serial)
      own.forEach(({ reading }, i) => {
        const before = i === 0 ? 0 : own[i - 1]!.reading.instrument.sequence!
        const step = reading.instrument.sequence! - before
        if (step !== 1) missing.set(`${serial} after ${before}`, step - 1)
      })
    }
    expect(missing).toEqual(new Map(scenario.stories.sequenceGaps.map(gap => [`${gap.instrument} after ${gap.after}`, gap.missing])))
    expect(missing.size).toBe(3)
    expect(new Set(organisation.readings.map(({ reading }) => reading.id)).size).toBe(organisation.readings.length)
  })

  it('keeps a gap whose moment falls between two samples close together', () => {
    expect(demoScenario({ seed: 121, now: new Date('2025-09-17T18:28:48Z') }).stories.sequenceGaps).toHaveLength(3)
  })

  it('is mostly clean', () => {
    const vehicles = organisation.readings.filter(({ reading }) => reading.subject.kind === 'vehicle')
    const clean = vehicles.filter(({ reading }) => declaredPercent(reading.composition, reading.declared) >= 98.4)
    expect(clean.length / vehicles.length).toBeGreaterThan(0.94)
    expect(clean.length / vehicles.length).toBeLessThan(0.975)
  })

  it('has more work in summer than in winter', () => {
    const inMonths = (months: number[]) => organisation.readings.filter(({ reading, sampledAt }) => reading.subject.kind === 'vehicle' && months.includes(sampledAt.getUTCMonth())).length
    expect(inMonths([5, 6, 7])).toBeGreaterThan(1.6 * inMonths([11, 0, 1]))
  })

  it('gives every vehicle an invented make and a VIN that no country assigns', () => {
    const makes = new Map(MAKES.map(make => [make.name, make]))
    expect(new Set(organisation.vehicles.map(({ vin }) => vin)).size).toBe(organisation.vehicles.length)
    for (const vehicle of organisation.vehicles) {
      expect(makes.get(vehicle.make)?.models).toContain(vehicle.model)
      expect(vehicle.vin).toMatch(/^G[A-HJ-NPR-Z0-9]{16}$/)
      expect(checkDigitOf(vehicle.vin) === vehicle.vin[8]).toBe(vehicle.checkDigitMeant)
    }
    // The worked sample of 49 CFR 565.15(c): the check of this test is right.
    expect(checkDigitOf('1G4AH59H45G118341')).toBe('4')
    const unmeant = organisation.vehicles.filter(({ checkDigitMeant }) => !checkDigitMeant)
    expect(unmeant.length).toBeGreaterThan(8)
    expect(unmeant.length).toBeLessThan(50)
  })

  it('declares the refrigerant by the age of the vehicle', () => {
    const shareOf = (declared: string, from: number, to: number) => {
      const group = organisation.vehicles.filter(({ modelYear }) => modelYear >= from && modelYear <= to)
      return group.filter(vehicle => vehicle.declared === declared).length / group.length
    }
    expect(shareOf('R-1234yf', 1990, 2012)).toBe(0)
    expect(shareOf('R-1234yf', 2018, 2026)).toBeGreaterThan(0.88)
    expect(shareOf('R-12', 1990, 1994)).toBeGreaterThan(0)
    expect(shareOf('R-12', 1995, 2026)).toBe(0)
  })

  it('weighs every gram: cylinders and vehicles balance exactly', () => {
    const cylinders = new Map(organisation.cylinders.map(cylinder => [cylinder.tag, { balance: cylinder.openingGrams, cylinder }]))
    const labels = new Map(organisation.vehicles.map(({ vin, labelGrams }) => [vin, labelGrams]))
    const vehicles = new Map<string, number>()
    expect(organisation.movements.length).toBeGreaterThan(4_000)
    for (const { massGrams, from, to, at } of organisation.movements) {
      expect(Number.isInteger(massGrams) && massGrams > 0 && at < NOW).toBe(true)
      if (from.kind === 'cylinder') cylinders.get(from.tag)!.balance -= massGrams
      if (to.kind === 'cylinder') cylinders.get(to.tag)!.balance += massGrams
      // What a vehicle lost on the road is not a movement: no more than its label can come out, and a charge fills it to the label.
      if (from.kind === 'vehicle') expect(massGrams).toBeLessThanOrEqual(labels.get(from.vin)!)
      if (to.kind === 'vehicle') vehicles.set(to.vin, massGrams)
    }
    for (const { balance, cylinder } of cylinders.values()) {
      expect(balance).toBe(cylinder.contentsGrams)
      expect(balance).toBeGreaterThanOrEqual(0)
      expect(balance).toBeLessThanOrEqual(cylinder.capacityGrams)
    }
    for (const [vin, charged] of vehicles) {
      const residue = labels.get(vin)! - charged
      expect(residue).toBeGreaterThan(0)
      expect(residue).toBeLessThanOrEqual(Math.round(labels.get(vin)! * 0.015))
    }
  })

  it('has people of every role with long passwords and addresses that lead nowhere', () => {
    const people = [...organisation.people, ...scenario.otherOrganisation.people]
    for (const { email, password, places } of people) {
      expect(email).toMatch(/@[a-z]+\.example$/)
      expect(password.length).toBeGreaterThanOrEqual(15)
      expect(places.length).toBeGreaterThan(0)
    }
    expect(new Set(people.map(({ email }) => email)).size).toBe(people.length)
    expect(new Set(organisation.people.flatMap(({ places }) => places.map(({ role }) => role)))).toEqual(new Set(['technician', 'advisor', 'quality', 'owner']))
    expect(organisation.people.filter(({ certification }) => certification !== undefined)).toHaveLength(4)
  })

  it('leaves the stranger with a tag and a vehicle that the group has too', () => {
    const other = scenario.otherOrganisation
    const tags = new Set(organisation.cylinders.map(({ tag }) => tag))
    expect(other.cylinders.some(({ tag }) => tags.has(tag))).toBe(true)
    const vins = new Set(organisation.vehicles.map(({ vin }) => vin))
    expect(other.readings.some(({ reading }) => reading.subject.kind === 'vehicle' && vins.has(reading.subject.vin!))).toBe(true)
    expect(other.readings.length).toBeGreaterThan(25)
    expect(other.readings.length).toBeLessThan(80)
  })
})
