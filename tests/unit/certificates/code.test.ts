import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CODE_BYTES, codeOf, groupedCode, readCode } from '#shared/certificates/code'

const bytes = fc.uint8Array({ minLength: CODE_BYTES, maxLength: CODE_BYTES })

describe('the code of a certificate', () => {
  it('keeps all its eighty bits', () => {
    expect(codeOf(new Uint8Array(10))).toBe('2222222222222222')
    expect(codeOf(new Uint8Array(10).fill(255))).toBe('ZZZZZZZZZZZZZZZZ')
    fc.assert(fc.property(bytes, fc.nat(79), (given, bit) => {
      const other = Uint8Array.from(given)
      other[bit >> 3]! ^= 1 << (bit & 7)
      const [one, two] = [codeOf(given), codeOf(other)]
      expect([...one].filter((sign, index) => sign !== two[index])).toHaveLength(1)
    }))
    expect(() => codeOf(new Uint8Array(9))).toThrow(RangeError)
  })

  it('has no signs that are taken for one another, and is read back however it is typed', () => {
    fc.assert(fc.property(bytes, (given) => {
      const code = codeOf(given)
      expect(code).toMatch(/^[^01IO\W_a-z]{16}$/)
      expect(readCode(groupedCode(code))).toBe(code)
      expect(readCode(` ${code.toLowerCase()}\n`)).toBe(code)
    }))
  })

  it('is nothing else', () => {
    for (const text of ['', '2222', '2'.repeat(17), '0222222222222222', 'ß222222222222222', '22222222222222\u0000\u0000']) expect(readCode(text), text).toBeNull()
    expect(groupedCode('')).toBe('')
  })
})
