import { describe, expect, it } from 'vitest'
import type { ReadingDetail } from '../../../shared/api/readings'
import { SUBSTANCES } from '../../../shared/refrigerants/designations'
import { lensEnd, lensTicks, stripFromDetail, stripFromRow, stripSentence, type Lane } from '#shared/composition/strip'
import { SUBSTANCE_LOOKS } from '#shared/composition/substance-look'

const words = { title: '', finding: '', unit: '% by mass', source: '', mark: 'verified' as const }
const rule = (name: string, more: object) => ({ rule: name, outcome: 'pass', measured: null, uncertainty: null, limit: null, probabilityBeyond: null, words, ...more })
const part = (substance: string, percent: number, belowDetection = false) => ({
  substance, massFraction: belowDetection ? 0 : percent / 100, massFractionLow: 0, massFractionHigh: percent / 100, moleFraction: percent / 100, belowDetection,
})

const reading = {
  declared: 'R-134a', purityPercent: 98.1, purityUncertainty: 0.5, resolution: 0.1,
  composition: { parts: [part('R-134a', 98.1), part('R-22', 0.4), part('HC', 1.5), part('R-12', 0.1, true)], air: { ...part('air', 2), belowDetection: false } },
  rules: [
    rule('flammable', { measured: 1.5, uncertainty: 0.3, limit: 0.5, outcome: 'fail' }),
    rule('foreign', { substance: 'R-22', measured: 0.4, uncertainty: 0.4, limit: 2 }),
    rule('air-caution', { measured: 2.1, uncertainty: 0.2, limit: 1.5, outcome: 'warn' }),
    rule('air-action', { measured: 2.1, uncertainty: 0.2, limit: 3 }),
  ],
  marks: { purityMinimum: 98, foreignMaximum: 2, flammableMaximum: 0.5, unknownMaximum: 1, airCaution: 1.5, airAction: 3 },
  limitSet: { guardFactor: 0.5 },
} as unknown as ReadingDetail

describe('stripFromDetail', () => {
  const strip = stripFromDetail(reading)

  it('makes a lane of everything but the declared refrigerant: largest first, below detection after, air last', () => {
    expect(strip.lanes.map(lane => lane.substance)).toEqual(['HC', 'R-22', 'R-12', 'air'])
  })

  it('gives the group its limit from the rule on the whole, with the guard band in front', () => {
    expect(strip.lanes[0]).toMatchObject({ percent: 1.5, uncertainty: 0.3, outcome: 'fail', limits: [{ at: 0.5, guard: { from: 0.35, to: 0.5 } }] })
  })

  it('draws the band of foreign refrigerant on both sides, and none for air', () => {
    expect(strip.lanes[1]!.limits).toEqual([{ at: 2, words: 'foreign', guard: { from: 1.8, to: 2.2 } }])
    expect(strip.lanes[3]!.limits.every(limit => limit.guard === null)).toBe(true)
  })

  it('counts the components of a declared blend as the blend', () => {
    const blend = stripFromDetail({ ...reading, declared: 'R-410A', rules: [], composition: { ...reading.composition, parts: [part('R-32', 50), part('R-125', 49), part('R-22', 1)] } } as unknown as ReadingDetail)
    expect(blend.lanes.map(lane => lane.substance)).toEqual(['R-22', 'air'])
  })

  it('begins a guard band wider than the limit at zero', () => {
    const wide = stripFromDetail({ ...reading, limitSet: { ...reading.limitSet, guardFactor: 2 } })
    expect(wide.lanes[0]!.limits[0]!.guard!.from).toBe(0)
  })

  it('draws no guard band under simple acceptance', () => {
    const simple = stripFromDetail({ ...reading, limitSet: { ...reading.limitSet, guardFactor: 0 } })
    expect(simple.lanes.flatMap(lane => lane.limits).every(limit => limit.guard === null)).toBe(true)
  })

  it('shows the detection limit of what was not found, without a whisker', () => {
    expect(strip.lanes[2]).toMatchObject({ percent: 0.1, belowDetection: true, uncertainty: null, limits: [{ at: 2 }] })
  })

  it('shows air on the basis of its limit, with both levels', () => {
    expect(strip.lanes[3]).toMatchObject({ percent: 2.1, outcome: 'warn', limits: [{ at: 1.5 }, { at: 3 }] })
  })
})

describe('lensEnd', () => {
  const lane = (percent: number, uncertainty: number | null, limit: number) => ({ percent, uncertainty, limits: [{ at: limit, words: '', guard: null }] }) as unknown as Lane

  it('is 5 % at first and wider when a value, a whisker or a limit needs it', () => {
    expect(lensEnd([])).toBe(5)
    expect(lensEnd([lane(4.6, 0.4, 2)])).toBe(5)
    expect(lensEnd([lane(4.7, 0.4, 2)])).toBe(10)
    expect(lensEnd([lane(0, null, 12)])).toBe(20)
    expect(lensEnd([lane(99, 5, 2)])).toBe(100)
  })

  it('has round ticks', () => {
    expect(lensTicks(10)).toEqual([0, 2, 4, 6, 8, 10])
  })
})

it('says the strip in a sentence', () => {
  const row = { declared: 'R-134a', purityPercent: 98.4, purityUncertainty: 0.5, resolution: 0.1, contaminants: [{ substance: 'HC', percent: 1.6 }], airPercent: 0.4 } as const
  expect(stripSentence(stripFromRow({ ...row, contaminants: [...row.contaminants] }))).toBe('R-134a 98.4 plus or minus 0.5 % by mass, air-free; Hydrocarbons 1.6 %, Air 0.4 %.')
})

it('gives every substance a pattern of its own', () => {
  const marks = SUBSTANCES.map(substance => SUBSTANCE_LOOKS[substance].mark)
  expect(new Set(marks).size).toBe(SUBSTANCES.length)
})
