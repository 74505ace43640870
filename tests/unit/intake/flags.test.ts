import { describe, expect, it } from 'vitest'
import type { SumCheck } from '#shared/composition/types'
import { flagsFor } from '#shared/intake/flags'
import { reading } from './samples'

const agrees: SumCheck = { percent: 100, differencePercent: 0, tolerancePercent: 0.1, outcome: 'agrees' }
const sampledAt = Date.parse(reading().sampledAt)
const minutes = 60_000
const days = 86_400_000

function flagsAt(age: number, sum = agrees) {
  return flagsFor({ reading: reading(), sum, receivedAt: new Date(sampledAt + age) })
}

describe('flags of a reading', () => {
  it.each([
    ['J20 nine minutes ahead', -9 * minutes, []],
    ['ten minutes ahead', -10 * minutes, []],
    ['J20 eleven minutes ahead', -11 * minutes, ['ahead']],
    ['thirty days late', 30 * days, []],
    ['thirty-one days late', 31 * days, ['late']],
  ])('%s', (_, age, flags) => {
    expect(flagsAt(age)).toEqual(flags)
  })

  it.each([
    ['a VIN that fails its check digit', { kind: 'vehicle', vin: '1HGCM82633A004353' }, ['vin-check-digit']],
    ['one with a letter that no VIN has', { kind: 'vehicle', vin: '1VWBH7AI0DC104945' }, ['vin-check-digit']],
    ['one that fits, in small letters and with spaces', { kind: 'vehicle', vin: '1hgc m826 33a0 0435 2' }, []],
    ['a shorter number, as old vehicles have', { kind: 'vehicle', vin: '136277S100123' }, []],
    ['a vehicle known by its plate', { kind: 'vehicle', plate: 'TST 001' }, []],
    ['a cylinder whose tag is as long as a VIN', { kind: 'cylinder', tag: '1HGCM82633A004353' }, []],
  ])('%s', (_, subject, flags) => {
    const given = reading((value) => {
      value.subject = subject
    })
    expect(flagsFor({ reading: given, sum: agrees, receivedAt: new Date(sampledAt) })).toEqual(flags)
  })

  it('a sum that rounding alone does not explain', () => {
    expect(flagsAt(0, { ...agrees, outcome: 'flagged' })).toEqual(['sum'])
  })
})
