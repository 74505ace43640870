import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { randomStream } from '#fixtures/demo/random'
import { inventVin } from '#fixtures/demo/vin'
import { checkVin, modelYearOf, normaliseVin, withCheckDigit } from '#shared/vehicles/vin'

const ALLOWED = 'ABCDEFGHJKLMNPRSTUVWXYZ0123456789'
// By hand from 49 CFR 565.15(c): what a character is worth, and what a position weighs.
const VALUE: Record<string, number> = Object.fromEntries(['0', 'AJ1', 'BKS2', 'CLT3', 'DMU4', 'ENV5', 'FW6', 'GPX7', 'HY8', 'RZ9'].flatMap((row, value) => [...row].map(character => [character, value])))
const WEIGHT = [8, 7, 6, 5, 4, 3, 2, 10, 0, 9, 8, 7, 6, 5, 4, 3, 2]

const character = fc.constantFrom(...ALLOWED)
const seventeen = fc.array(character, { minLength: 17, maxLength: 17 }).map(list => list.join(''))
const replaced = (text: string, index: number, by: string) => text.slice(0, index) + by + text.slice(index + 1)

describe('the check digit of a VIN', () => {
  it('fits what was made to fit, and nothing else does in its place', () => {
    fc.assert(fc.property(seventeen, character, (text, other) => {
      const vin = withCheckDigit(text)
      expect(checkVin({ vin })).toMatchObject({ valid: true, reason: null, length: 17 })
      fc.pre(other !== vin[8])
      expect(checkVin({ vin: replaced(vin, 8, other) })).toMatchObject({ valid: false, reason: 'check digit', checkDigit: vin[8] })
    }))
  })

  it('catches every wrong character whose value differs, at every position', () => {
    fc.assert(fc.property(seventeen, (text) => {
      const vin = withCheckDigit(text)
      for (let index = 0; index < 17; index++) {
        if (index === 8) continue
        for (const other of ALLOWED) {
          // No weight but 0 and no difference of values but 0 is a multiple of 11.
          expect(checkVin({ vin: replaced(vin, index, other) }).valid, `${vin} with ${other} at ${index + 1}`).toBe(VALUE[other] === VALUE[vin[index]!])
        }
      }
    }), { numRuns: 30 })
  })

  it('catches neighbours that changed places where value and weight allow', () => {
    fc.assert(fc.property(seventeen, fc.integer({ min: 0, max: 15 }), (text, index) => {
      const vin = withCheckDigit(text)
      fc.pre(index !== 7 && index !== 8)
      const [a, b] = [vin[index]!, vin[index + 1]!]
      const swapped = vin.slice(0, index) + b + a + vin.slice(index + 2)
      const change = (VALUE[a]! - VALUE[b]!) * (WEIGHT[index + 1]! - WEIGHT[index]!)
      expect(checkVin({ vin: swapped }).valid).toBe(change % 11 === 0)
    }))
  })

  it('is not asked of a number of another length or with letters that no VIN has', () => {
    expect(checkVin({ vin: '1HGCM82633A00435' })).toMatchObject({ valid: false, reason: 'length', length: 16, sum: null, checkDigit: null })
    expect(checkVin({ vin: '1VWBH7AI0DC104945' })).toMatchObject({ valid: false, reason: 'forbidden character', position: 8, sum: null })
    expect(checkVin({ vin: '' })).toMatchObject({ valid: false, reason: 'length', length: 0, position9: null })
    fc.assert(fc.property(seventeen, fc.integer({ min: 0, max: 16 }), fc.constantFrom('I', 'O', 'Q', 'Ä', '€'), (text, index, forbidden) => {
      expect(checkVin({ vin: replaced(text, index, forbidden) })).toMatchObject({ valid: false, reason: 'forbidden character', position: index + 1 })
    }))
  })

  it('never throws, whatever is typed', () => {
    fc.assert(fc.property(fc.string(), (text) => {
      expect(checkVin({ vin: text }).length).toBe(normaliseVin(text).length)
      expect(modelYearOf({ vin: text }).candidates.length % 2).toBe(0)
    }))
  })
})

describe('a VIN as it is written', () => {
  it('loses spaces, hyphens, points and small letters, and nothing else', () => {
    expect(normaliseVin(' 1hgc-m826.33a 004352\n')).toBe('1HGCM82633A004352')
    expect(normaliseVin('O0 I1')).toBe('O0I1')
    expect(checkVin({ vin: '1hgc m826 33a0 0435 2' }).valid).toBe(true)
    fc.assert(fc.property(fc.string(), (text) => {
      expect(normaliseVin(normaliseVin(text))).toBe(normaliseVin(text))
    }))
  })

  it('can\'t be made of what is no VIN', () => {
    expect(() => withCheckDigit('1HGCM82633A00435')).toThrow(RangeError)
    expect(() => withCheckDigit('IHGCM82633A004352')).toThrow(RangeError)
  })
})

describe('the model year', () => {
  const withYear = (code: string, position7: string) => modelYearOf({ vin: `1HGCM8${position7}63${code}A004352` })
  it.each([['A', '2', 1980], ['Y', '2', 2000], ['1', '2', 2001], ['9', '2', 2009], ['A', 'A', 2010], ['H', 'B', 2017], ['J', 'B', 2018], ['Y', 'C', 2030], ['9', 'C', 2039]])('%s with %s at position 7 is %i', (code, position7, year) => {
    expect(withYear(code, position7).modelYear).toBe(year)
  })

  it('names both years that the code may mean, for vehicles whose position 7 tells nothing', () => {
    expect(withYear('3', '2').candidates).toEqual([2003, 2033])
  })

  it('is not guessed from a code that is no year', () => {
    for (const code of ['U', 'Z', '0']) expect(withYear(code, '2')).toEqual({ modelYear: null, candidates: [] })
    expect(modelYearOf({ vin: 'short' })).toEqual({ modelYear: null, candidates: [] })
  })
})

describe('the VINs of the invented fleet, which has arithmetic of its own', () => {
  it('fit, with their model year, where they are meant to', () => {
    const random = randomStream(1, 'vin')
    for (let year = 1990; year < 2030; year++) {
      const vin = inventVin(random, 'GA1', year, year * 7, true)
      expect(checkVin({ vin }), vin).toMatchObject({ valid: true })
      expect(modelYearOf({ vin }).modelYear).toBe(year)
      const foreign = inventVin(random, 'GA1', year, year * 7, false)
      expect(checkVin({ vin: foreign }), foreign).toMatchObject({ valid: false, reason: 'check digit' })
      expect(modelYearOf({ vin: foreign }).modelYear).toBeNull()
    }
  })
})
