import { describe, expect, it } from 'vitest'
import { nestedStudy, nestedStudyOfReadings } from '#shared/statistics/nested'

describe('nested study', () => {
  it('gives the same from readings as from averages and spreads', () => {
    const readings = [[[1, 3], [2, 6], [4, 4]], [[7, 9], [8, 8], [6, 12]]]
    const found = nestedStudyOfReadings(readings)
    const same = nestedStudy([
      { averages: [2, 4, 4], standardDeviations: [Math.sqrt(2), Math.sqrt(8), 0] },
      { averages: [8, 8, 9], standardDeviations: [Math.sqrt(2), 0, Math.sqrt(18)] },
    ], 2)
    for (const study of [found, same]) {
      expect(study).toMatchObject({
        repeats: { standardDeviation: expect.closeTo(Math.sqrt(5), 12), df: 6 },
        days: { standardDeviation: expect.closeTo(Math.sqrt(5 / 6), 12), df: 4 },
        runs: { standardDeviation: expect.closeTo(Math.sqrt(12.5), 12), df: 1 },
        daysVariance: expect.closeTo(5 / 6 - 5 / 2, 12),
        runsVariance: expect.closeTo(12.5 - 5 / 18, 12),
      })
    }
  })

  it('says nothing about stability from one run', () => {
    expect(nestedStudy([{ averages: [1, 2], standardDeviations: [1, 1] }], 3))
      .toMatchObject({ runs: null, runsVariance: null, reason: 'one run only: nothing is known about stability' })
  })

  it('reports a negative component as it comes, with words', () => {
    const found = nestedStudy([{ averages: [1, 1.1], standardDeviations: [3, 3] }, { averages: [5, 5.1], standardDeviations: [3, 3] }], 2)
    expect(found).toMatchObject({ reason: 'a negative component is shown as 0' })
    expect('daysVariance' in found && found.daysVariance).toBeLessThan(0)
  })

  it('is refused in words when unbalanced or too small', () => {
    expect(nestedStudy([{ averages: [1, 2], standardDeviations: [1] }], 2).reason).toContain('unbalanced')
    expect(nestedStudy([{ averages: [1], standardDeviations: [1] }], 2).reason).toContain('two days')
    expect(nestedStudyOfReadings([[[1, 2], [1]]]).reason).toContain('unbalanced')
    expect(nestedStudyOfReadings([[[1], [1]]]).reason).toContain('repeats')
    expect(nestedStudyOfReadings([]).reason).toContain('repeats')
    expect(() => nestedStudy([{ averages: [NaN], standardDeviations: [1] }], 2)).toThrow('runs[0].averages[0]')
  })
})
