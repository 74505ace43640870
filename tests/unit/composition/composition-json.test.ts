import canonicalize from 'canonicalize'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compositionJson, reportedJson } from '#shared/composition/composition-json'
import { normaliseComposition } from '#shared/composition/normalise'
import type { ReportedComposition } from '#shared/composition/types'
import { SUBSTANCES } from '#shared/refrigerants/designations'

const reported: fc.Arbitrary<ReportedComposition> = fc.record({
  basis: fc.constantFrom('mass', 'mole'),
  air: fc.constantFrom('apart', 'within'),
  resolution: fc.constantFrom(0.1, 1, 0.05),
  parts: fc.uniqueArray(fc.record({ substance: fc.constantFrom(...SUBSTANCES), percent: fc.double({ min: 0, max: 100, noNaN: true }), qualifier: fc.constant('<') }, { requiredKeys: ['substance', 'percent'] }), { selector: part => part.substance, minLength: 1, maxLength: 6 }),
  airPercent: fc.double({ min: 0, max: 100, noNaN: true }),
  airQualifier: fc.constant('<'),
}, { requiredKeys: ['basis', 'air', 'resolution', 'parts'] }) as fc.Arbitrary<ReportedComposition>

describe('canonical texts written by hand', () => {
  it('of a reported composition are those of RFC 8785', () => {
    fc.assert(fc.property(reported, (composition) => {
      const text = reportedJson(composition)
      expect(text).toBe(canonicalize(JSON.parse(text)))
      expect(JSON.parse(text)).toEqual(JSON.parse(JSON.stringify(composition)))
    }))
  })

  it('of a normalised composition are those of RFC 8785, with fractions to the ten-billionth', () => {
    fc.assert(fc.property(reported, (composition) => {
      const normalised = normaliseComposition(composition)
      const text = compositionJson(normalised)
      expect(text).toBe(canonicalize(JSON.parse(text)))
      const back = JSON.parse(text)
      expect(back.parts.map((part: { substance: string }) => part.substance)).toEqual(normalised.parts.map(part => part.substance))
      for (const [i, part] of normalised.parts.entries()) expect(back.parts[i].massFraction).toBeCloseTo(part.massFraction, 9)
      expect(back.sum.outcome).toBe(normalised.sum.outcome)
    }))
  })
})
