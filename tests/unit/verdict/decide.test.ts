import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { normaliseComposition } from '#shared/composition/normalise'
import type { ReportedPart } from '#shared/composition/types'
import type { Designation } from '#shared/refrigerants/designations'
import { decideVerdict } from '#shared/verdict/decide'
import { defaultLimitSet } from '#shared/verdict/limits'
import { VERDICTS, type EarlierSample, type SampleValidity, type VerdictInput } from '#shared/verdict/types'
import { explainRule, explainVerdict } from '#shared/verdict/words'

const fit: SampleValidity = { calibrationOverdue: false, filterSpent: false, ambientCelsius: 21, ambientMinimumCelsius: 10, ambientMaximumCelsius: 49, instrumentOutOfControl: false }
const limits = defaultLimitSet()
const simple = { ...limits, decision: { kind: 'simple' as const, guardFactor: 0 } }

function sample(parts: Record<string, number>, over: { air?: number, declared?: Designation, below?: Record<string, number>, earlier?: EarlierSample[], input?: Partial<VerdictInput> } = {}) {
  const reported: ReportedPart[] = [
    ...Object.entries(parts).map(([substance, percent]) => ({ substance: substance as ReportedPart['substance'], percent })),
    ...Object.entries(over.below ?? {}).map(([substance, percent]) => ({ substance: substance as ReportedPart['substance'], percent, qualifier: '<' as const })),
  ]
  const composition = normaliseComposition({ basis: 'mass', air: 'apart', resolution: 0.1, parts: reported, ...(over.air === undefined ? {} : { airPercent: over.air }) })
  const input: VerdictInput = {
    declared: over.declared ?? 'R-134a', composition, resolutionPercent: 0.1, uncertainty: { default: { absolutePercent: 0.15, relative: 0 } }, limits, validity: fit, earlier: over.earlier ?? [], ...over.input,
  }
  return { composition, resolutionPercent: 0.1, verdict: decideVerdict(input), words: explainVerdict(decideVerdict(input), { declared: input.declared, limits: input.limits, resolution: 0.1 }) }
}
const kind = (...args: Parameters<typeof sample>) => sample(...args).verdict.kind

describe('the next step', () => {
  it('for a clean system is to connect, also with contaminants below detection', () => {
    expect(kind({ 'R-134a': 99.4, 'HC': 0.6 })).toBe('connect')
    expect(kind({ 'R-134a': 99.7 }, { below: { HC: 0.3 }, air: 0.4 })).toBe('connect')
  })

  it('holds the purity limit as published: exactly 98 is kept, just under is not (SAE J2099)', () => {
    expect(kind({ 'R-134a': 98, 'R-22': 2 }, { input: { limits: simple } })).toBe('connect')
    expect(kind({ 'R-134a': 97.9, 'R-22': 2.1 }, { input: { limits: simple } })).toBe('isolate')
  })

  it('inside the guard band is to sample again, on either side of the limit', () => {
    expect(kind({ 'R-134a': 98.2, 'R-22': 1.8 })).toBe('sample-again')
    expect(kind({ 'R-134a': 97.8, 'R-22': 2.2 })).toBe('sample-again')
    expect(kind({ 'R-134a': 98.5, 'R-22': 1.5 })).toBe('connect')
    expect(kind({ 'R-134a': 97.4, 'R-22': 2.6 })).toBe('isolate')
  })

  it('keeps flammable content apart from purity: 98 % pure with 2 % hydrocarbon is still flammable', () => {
    const { verdict } = sample({ 'R-134a': 98, 'HC': 2 }, { input: { limits: simple } })
    expect(verdict).toMatchObject({ kind: 'isolate-flammable', decidedBy: 'flammable' })
    expect(verdict.results.find(result => result.rule === 'purity')!.outcome).toBe('pass')
    expect(kind({ 'R-134a': 98.1, 'HC': 1.9 }, { input: { limits: simple } })).toBe('connect')
    expect(kind({ 'R-134a': 98.2, 'R-290': 0.9, 'R-600a': 0.9 })).toBe('sample-again')
    expect(kind({ 'R-134a': 97.9, 'R-290': 1.1, 'R-600a': 1 })).toBe('isolate-flammable')
  })

  it('for what is not identified counts it as foreign and possibly flammable', () => {
    expect(sample({ 'R-134a': 97, 'OTHER': 3 }).verdict).toMatchObject({ kind: 'isolate-flammable', decidedBy: 'unknown' })
  })

  it('for the wrong refrigerant says what it looks like', () => {
    const wrong = sample({ 'R-134a': 99.6, 'R-22': 0.4 }, { declared: 'R-1234yf' })
    expect(wrong.verdict).toMatchObject({ kind: 'isolate', decidedBy: 'declared', decidedBySubstance: 'R-134a' })
    expect(wrong.words.reason).toContain('looks like R-134a')
    expect(kind({ 'R-1234yf': 99.6, 'R-134a': 0.4 })).toBe('isolate-flammable')
  })

  it('takes the named parts of a declared blend for the blend', () => {
    expect(kind({ 'R-125': 44, 'R-143a': 52, 'R-134a': 4 }, { declared: 'R-404A' })).toBe('connect')
  })

  it('for air is to note it, then to purge it', () => {
    expect(kind({ 'R-134a': 100 }, { air: 1.9 })).toBe('connect')
    expect(sample({ 'R-134a': 100 }, { air: 2 }).verdict.results.find(result => result.rule === 'air-caution')!.outcome).toBe('warn')
    expect(kind({ 'R-134a': 100 }, { air: 2.9 })).toBe('connect')
    expect(kind({ 'R-134a': 100 }, { air: 3 })).toBe('connect-purge-air')
    expect(kind({ 'R-134a': 90, 'R-22': 10 }, { air: 6 })).toBe('isolate')
  })

  it('of an unfit reading is to sample again; an overdue calibration is carried but does not stop', () => {
    for (const unfit of [{ filterSpent: true }, { instrumentOutOfControl: true }, { ambientCelsius: 9 }, { ambientCelsius: 50 }]) expect(kind({ 'R-134a': 100 }, { input: { validity: { ...fit, ...unfit } } })).toBe('sample-again')
    const overdue = sample({ 'R-134a': 100 }, { input: { validity: { ...fit, calibrationOverdue: true } } })
    expect(overdue.verdict.kind).toBe('connect')
    expect(overdue.words.cautions.join(' ')).toContain('calibration was overdue')
    expect(kind({ 'R-134a': 90, 'HC': 10 }, { input: { validity: { ...fit, filterSpent: true } } }), 'a danger is not talked away').toBe('isolate-flammable')
  })
})

describe('repeated samples', () => {
  it('that agree settle the matter on their mean', () => {
    const first = sample({ 'R-134a': 98.1, 'R-22': 1.9 })
    expect(first.verdict.kind).toBe('sample-again')
    expect(sample({ 'R-134a': 98.3, 'R-22': 1.7 }, { earlier: [first] }).verdict).toMatchObject({ kind: 'connect', attempt: 2, purityPercent: 98.2 })
    const low = sample({ 'R-134a': 97.8, 'R-22': 2.2 })
    expect(kind({ 'R-134a': 97.9, 'R-22': 2.1 }, { earlier: [low] })).toBe('isolate')
  })

  it('doubt about flammables counts against', () => {
    const first = sample({ 'R-134a': 98.2, 'HC': 1.8 })
    expect(first.verdict.kind).toBe('sample-again')
    expect(kind({ 'R-134a': 98.2, 'HC': 1.8 }, { earlier: [first] })).toBe('isolate-flammable')
  })

  it('that disagree settle nothing, whatever the last one shows', () => {
    const foul = sample({ 'R-134a': 90, 'R-22': 10 })
    expect(sample({ 'R-134a': 100 }, { earlier: [foul] }).verdict).toMatchObject({ kind: 'sample-again', decidedBy: 'repeats', attempt: 2 })
    const burning = sample({ 'R-134a': 94, 'HC': 6 })
    expect(kind({ 'R-134a': 100 }, { earlier: [burning] }), 'a flammable finding stands').toBe('isolate-flammable')
  })

  it('three later ones that agree pass over one that does not, and say so', () => {
    const foul = sample({ 'R-134a': 90, 'R-22': 10 })
    const clean = sample({ 'R-134a': 100 })
    expect(kind({ 'R-134a': 100 }, { earlier: [foul, clean] })).toBe('sample-again')
    const settled = sample({ 'R-134a': 100 }, { earlier: [foul, clean, clean] })
    expect(settled.verdict).toMatchObject({ kind: 'connect', attempt: 4 })
    expect(settled.words.cautions.join(' ')).toContain('passed over')
  })
})

describe('properties of every verdict', () => {
  const severity = (given: string) => ['connect', 'connect-purge-air', 'sample-again', 'isolate', 'isolate-flammable'].indexOf(given)

  it('more of a contaminant never gives a milder next step', () => {
    for (const substance of ['HC', 'R-22', 'OTHER', 'R-1234yf']) {
      fc.assert(fc.property(fc.double({ min: 0, max: 49, noNaN: true }), fc.double({ min: 0, max: 20, noNaN: true }), (percent, more) => {
        const worse = Math.min(percent + more, 49.9)
        expect(severity(kind({ 'R-134a': 100 - worse, [substance]: worse }))).toBeGreaterThanOrEqual(severity(kind({ 'R-134a': 100 - percent, [substance]: percent })))
      }))
    }
  })

  it('the order of the parts makes no difference', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 5, noNaN: true }), fc.double({ min: 0, max: 5, noNaN: true }), (hc, r22) => {
      const one = sample({ 'R-134a': 100 - hc - r22, 'HC': hc, 'R-22': r22 }).verdict
      const other = sample({ 'R-22': r22, 'HC': hc, 'R-134a': 100 - hc - r22 }).verdict
      expect(other.kind).toBe(one.kind)
      expect(other.purityPercent).toBeCloseTo(one.purityPercent, 6)
    }))
  })

  it('a probability accompanies every number that was measured with doubt, and lies between 0 and 1', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 10, noNaN: true }), (r22) => {
      for (const result of sample({ 'R-134a': 100 - r22, 'R-22': r22 }, { air: 1 }).verdict.results) {
        if (result.uncertainty === null) continue
        expect(result.probabilityBeyond).toBeGreaterThanOrEqual(0)
        expect(result.probabilityBeyond).toBeLessThanOrEqual(1)
      }
    }))
  })

  it('no words claim what an instrument can\'t show', () => {
    const seen = new Set<string>()
    for (const given of [sample({ 'R-134a': 100 }, { air: 0 }), sample({ 'R-134a': 100 }, { air: 5 }), sample({ 'R-134a': 98.1, 'R-22': 1.9 }), sample({ 'R-134a': 80, 'R-22': 20 }), sample({ 'R-134a': 90, 'HC': 10 }), sample({ 'R-1234yf': 100 }, { declared: 'R-1234yf' })]) {
      seen.add(given.verdict.kind)
      const text = [given.words.tag, given.words.nextStep, given.words.reason, given.words.plain, ...given.words.cautions, ...given.verdict.results.flatMap(result => Object.values(explainRule(result, limits, 'R-134a')))].join(' ')
      expect(text).not.toMatch(/\bpure\b|meets|certif(y|ies) the/i)
      expect(text).toContain('Moisture and oil were not measured')
      expect(text).toContain('local law')
      for (const result of given.verdict.results) expect(explainRule(result, limits, 'R-134a').source.length).toBeGreaterThan(5)
    }
    expect([...seen].sort()).toEqual([...VERDICTS].sort())
  })
})
