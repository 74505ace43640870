import canonicalize from 'canonicalize'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { normaliseComposition } from '#shared/composition/normalise'
import { decideVerdict } from '#shared/verdict/decide'
import { defaultLimitSet } from '#shared/verdict/limits'
import { verdictJson } from '#shared/verdict/verdict-json'

const validity = { calibrationOverdue: true, filterSpent: false, ambientCelsius: 21, ambientMinimumCelsius: 10, ambientMaximumCelsius: 49, instrumentOutOfControl: false }

describe('a verdict\'s canonical text', () => {
  it('is that of RFC 8785, and reads back as the verdict', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 5, noNaN: true }), fc.double({ min: 0, max: 5, noNaN: true }), fc.boolean(), (hc, r22, hidden) => {
      const verdict = decideVerdict({
        declared: 'R-134a', resolutionPercent: 0.1, uncertainty: { default: { absolutePercent: 0.2, relative: 0.01 } }, limits: defaultLimitSet(), validity, earlier: [],
        composition: normaliseComposition({
          basis: 'mass', air: 'apart', resolution: 0.1, airPercent: 1.2,
          parts: [{ substance: 'R-134a', percent: 100 - hc - r22 }, { substance: 'HC', percent: hc, ...(hidden ? { qualifier: '<' as const } : {}) }, { substance: 'R-22', percent: r22 }],
        }),
      })
      const text = verdictJson(verdict)
      expect(JSON.parse(text)).toEqual(verdict)
      expect(text).toBe(canonicalize(verdict))
    }))
  })
})
