import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  approximateCpkInterval, capabilityIndices, capabilityRatioInterval, capabilityStudy, exactOneSidedInterval,
} from '#shared/statistics/capability'

const steady = Array.from({ length: 30 }, (_, i) => 99 + ((i * 7) % 10) / 20)

describe('capability indices', () => {
  it('give only the one index for one limit', () => {
    const found = capabilityIndices({ mean: 99, sigma: 0.25, limits: { lower: 98 } })
    expect(found).toMatchObject({ cp: null, cpu: null, cpk: found.cpl, k: null, cpm: null, reason: 'one limit only: no Cp' })
    expect(found.cpl).toBeCloseTo(4 / 3, 14)
  })

  it('never let Cpk pass Cp, equal in the middle', () => {
    fc.assert(fc.property(fc.double({ min: -5, max: 5, noNaN: true }), fc.double({ min: 0.1, max: 3, noNaN: true }), (mean, sigma) => {
      const { cp, cpk, k } = capabilityIndices({ mean, sigma, limits: { lower: -3, upper: 3 } })
      expect(cpk!).toBeLessThanOrEqual(cp! + 1e-12)
      expect(cpk!).toBeCloseTo(cp! * (1 - k!), 9)
    }))
  })

  it('are refused without spread', () => {
    expect(capabilityIndices({ mean: 1, sigma: 0, limits: { upper: 2 } })).toMatchObject({ cpk: null, expectedShareBeyond: null })
    expect(() => capabilityIndices({ mean: NaN, sigma: 1, limits: { upper: 2 } })).toThrow('mean')
  })
})

describe('intervals of capability', () => {
  it('hold the index, and the exact one nears the approximate one with n', () => {
    for (const index of [-0.4, 0.3, 1, 1.67]) {
      for (const n of [5, 30, 400]) {
        const exact = exactOneSidedInterval(index, n, 0.95)
        expect(exact.lower!).toBeLessThan(index)
        expect(exact.upper!).toBeGreaterThan(index)
      }
      const [exact, approximate] = [exactOneSidedInterval(index, 400, 0.95), approximateCpkInterval(index, 400, 0.95)]
      expect(exact.lower!).toBeCloseTo(approximate.lower!, 2)
      expect(exact.upper!).toBeCloseTo(approximate.upper!, 2)
    }
    const ratio = capabilityRatioInterval(1, 29, 0.95)
    expect(ratio.lower!).toBeLessThan(1)
    expect(ratio.upper!).toBeGreaterThan(1)
  })

  it('need two values', () => {
    expect(exactOneSidedInterval(1, 1, 0.95).reason).toContain('two values')
    expect(approximateCpkInterval(1, 1, 0.95).reason).toContain('two values')
  })
})

describe('capability study', () => {
  const settings = { limits: { lower: 98 }, confidence: 0.95, chartQuiet: true }

  it('shows the indices of a quiet process, exact with one limit', () => {
    const study = capabilityStudy(steady, settings)
    expect(study).toMatchObject({ shown: true, refusals: [], warnings: [], ppkMethod: 'exact' })
    expect(study.overall!.cpk!).toBeGreaterThan(study.ppkInterval.lower!)
    expect(study.ppInterval.reason).toContain('one limit')
    expect(capabilityStudy(steady, { ...settings, limits: { lower: 98, upper: 101 } })).toMatchObject({ ppkMethod: 'approximate', ppInterval: { reason: null } })
  })

  it('shows nothing but the share outside where the chart has signals', () => {
    const study = capabilityStudy(steady, { ...settings, chartQuiet: false })
    expect(study).toMatchObject({ shown: false, within: null, overall: null, ppkMethod: null, outOfSpec: { outside: 0, n: 30 } })
    expect(study.refusals[0]).toContain('signals')
    expect(study.ppkInterval.lower).toBeNull()
  })

  it('refuses contaminants piled up at 0, and no spread', () => {
    const piled = [...Array.from({ length: 20 }, () => 0), 0.5, 1, 3]
    const study = capabilityStudy(piled, { ...settings, limits: { upper: 2 } })
    expect(study.refusals).toEqual(['values are piled up at 0: use the share outside'])
    expect(study.outOfSpec.outside).toBe(1)
    expect(capabilityStudy([5, 5, 5], settings).refusals.join()).toContain('equal')
    expect(capabilityStudy([5], settings).refusals.join()).toContain('two values')
  })

  it('warns below twenty-five', () => {
    expect(capabilityStudy(steady.slice(0, 24), settings).warnings).toHaveLength(1)
  })
})
