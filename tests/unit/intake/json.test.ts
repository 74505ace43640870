import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { decodeJson, placeInText } from '#shared/intake/json'
import { JsonSyntaxFault, scanJson } from '#shared/intake/json-scan'
import { checkRecord } from '#shared/intake/check-record'
import { decode, reading, readingText } from './samples'

const maxReadings = 5_000
const encode = (text: string): Uint8Array => new TextEncoder().encode(text)
const asJson = { mediaType: 'application/json' }

function failureOf(text: string | Uint8Array) {
  const decoding = decodeJson(typeof text === 'string' ? encode(text) : text, { maxReadings })
  return decoding.kind === 'failed' ? decoding.failure : undefined
}

function recordsOf(text: string) {
  const decoding = decodeJson(encode(text), { maxReadings })
  if (decoding.kind === 'failed') throw new Error(decoding.failure.reason)
  return decoding.records
}

describe('what is no JSON fails as a whole, with the place', () => {
  it.each([
    ['J01 nothing', '', 'empty', null],
    ['only spaces', ' \r\n\t', 'empty', null],
    ['J02 cut', '{"schema":', 'syntax', 'line 1, column 11'],
    ['cut in a text', '{"sch', 'syntax', 'line 1, column 6'],
    ['J03 something after it', `${readingText}x`, 'syntax', `line 1, column ${readingText.length + 1}`],
    ['J04 a trailing comma', `${readingText.slice(0, -1)},}`, 'syntax', `line 1, column ${readingText.length + 1}`],
    ['J05 single quotes', readingText.replaceAll('"', '\''), 'syntax', 'line 1, column 2'],
    ['J06 NaN', '{\n  "percent": NaN}', 'syntax', 'line 2, column 14'],
    ['J06 Infinity', '{\r\n"percent":Infinity}', 'syntax', 'line 2, column 11'],
    ['J06 -Infinity', '[-Infinity]', 'syntax', 'line 1, column 2'],
    ['an empty list', '{"readings":[]}', 'empty', null],
    ['a wrapper with more in it', `{"readings":[${readingText}],"x":1}`, 'unknown-member', null],
    ['a wrapper without list', '{"readings":{}}', 'type', '/readings'],
    ['the list twice', `{"readings":[${readingText}],"readings":[]}`, 'duplicate-member', '/readings'],
  ])('%s', (_, text, code, place) => {
    expect(failureOf(text)).toMatchObject({ code, place })
  })

  it('J12 bytes that are no UTF-8, with the offset of the first', () => {
    expect(failureOf(Uint8Array.of(0x22, 0x61, 0xC3, 0x28, 0x22))).toMatchObject({ code: 'encoding', place: 'byte 2' })
    expect(failureOf(Uint8Array.of(0x22, 0xED, 0xA0, 0x80, 0x22))).toMatchObject({ code: 'encoding', place: 'byte 1' })
    expect(failureOf(Uint8Array.of(0x22, 0xE2, 0x82))).toMatchObject({ code: 'encoding', place: 'byte 1' })
  })

  it('J22 more readings than allowed, at 5,000 and one more', () => {
    const list = (length: number): string => `{"readings":[${Array.from({ length }, () => readingText).join(',')}]}`
    expect(recordsOf(list(maxReadings))).toHaveLength(maxReadings)
    expect(failureOf(list(maxReadings + 1))).toMatchObject({ code: 'too-many-readings' })
    expect(failureOf(list(maxReadings + 1))!.reason).toContain('5000')
  })
})

describe('a fault in one record refuses that record', () => {
  it.each([
    ['J08 a member twice', readingText.replace('"percent":99.4', '"percent":99.4,"percent":50'), 'duplicate-member', '/composition/parts/0/percent'],
    ['a member twice, once escaped', readingText.replace('"percent":99.4', '"percent":99.4,"perc\\u0065nt":50'), 'duplicate-member', '/composition/parts/0/percent'],
    ['J14 1e400', readingText.replace('99.4', '1e400'), 'range', '/composition/parts/0/percent'],
    ['1e-400', readingText.replace('0.6', '1e-400'), 'range', '/composition/parts/1/percent'],
    ['J15 an integer that a double can\'t hold', readingText.replace('"sequence":1', '"sequence":9007199254740993'), 'range', '/instrument/sequence'],
    ['J10 a NUL', readingText.replace('"id"', '"note":"a\\u0000b","id"'), 'bad-character', '/note'],
    ['J11 half a surrogate pair', readingText.replace('"id"', '"note":"\\ud800","id"'), 'bad-character', '/note'],
    ['too deep a note', readingText.replace('"id"', `"note":${'['.repeat(40)}${']'.repeat(40)},"id"`), 'too-deep', undefined],
  ])('%s', async (_, faulty, code, pointer) => {
    const decoded = await decode(`{"readings":[${readingText},${faulty},${readingText}]}`, asJson)
    expect(decoded.readings).toEqual([reading(), reading()])
    expect(decoded.refusals).toEqual([expect.objectContaining({ code, ...(pointer === undefined ? {} : { pointer }) })])
    expect(decoded.records.map(({ ordinal }) => ordinal)).toEqual([1, 2, 3])
  })

  it('J23 values that are no readings', async () => {
    const decoded = await decode(`{"readings":[${readingText},17,null,"x",[],${readingText}]}`, asJson)
    expect(decoded.refusals.map(({ code, pointer }) => [code, pointer])).toEqual(Array.from({ length: 4 }, () => ['type', '']))
    expect(decoded.readings).toHaveLength(2)
  })

  it('J07 200,000 lists inside one another, quickly', () => {
    const text = '['.repeat(200_000) + ']'.repeat(200_000)
    const begin = performance.now()
    const [record] = recordsOf(text)
    expect(performance.now() - begin).toBeLessThan(1_000)
    expect(checkRecord(record!)).toMatchObject({ ok: false, refusals: [{ code: 'too-deep' }] })
  })

  it('takes depth up to the bound, and no more', () => {
    const nested = (depth: number): string => '['.repeat(depth) + ']'.repeat(depth)
    expect(recordsOf(nested(32))[0]!.refusals).toBeUndefined()
    expect(recordsOf(nested(33))[0]!.refusals).toMatchObject([{ code: 'too-deep' }])
    expect(recordsOf(`{"readings":[${nested(32)}]}`)[0]!.refusals).toBeUndefined()
    expect(recordsOf(`{"readings":[${nested(33)}]}`)[0]!.refusals).toMatchObject([{ code: 'too-deep' }])
  })
})

describe('what is taken', () => {
  it('one reading, with its source text exactly', () => {
    expect(recordsOf(` \n${readingText}\n`)).toEqual([{ ordinal: 1, line: null, value: reading(), raw: readingText, format: 'json' }])
  })

  it('a byte-order mark is dropped', () => {
    expect(recordsOf(`\uFEFF${readingText}`)[0]!.value).toEqual(reading())
  })

  it('each of a list keeps its own source text', () => {
    const spaced = JSON.stringify(reading(), null, 2)
    expect(recordsOf(`{ "readings" : [ ${spaced} ,\n ${readingText} ] }`).map(({ raw }) => raw)).toEqual([spaced, readingText])
  })

  it('a member called readings deeper down is no list of records', () => {
    expect(recordsOf('{"a":{"readings":[1,2]}}')).toHaveLength(1)
  })

  it('the largest integer that a double holds', () => {
    expect(recordsOf('9007199254740991')[0]!.value).toBe(9007199254740991)
    expect(recordsOf('-9007199254740992')[0]!.refusals).toMatchObject([{ code: 'range' }])
  })
})

describe('the scanner against JSON.parse', () => {
  const jsonText = fc.json({ maxDepth: 6 })

  it('finds nothing wrong with JSON, save numbers that a double can\'t hold', () => {
    fc.assert(fc.property(jsonText, (text) => {
      const { root } = scanJson(text, { depth: 32 })
      expect(root.refusals.filter(({ code }) => code !== 'range')).toEqual([])
      expect(JSON.parse(text.slice(root.start, root.end))).toEqual(JSON.parse(text))
    }), { numRuns: 1_000 })
  })

  it('refuses just what JSON.parse refuses', () => {
    const damage = fc.tuple(jsonText, fc.nat(), fc.nat({ max: 2 }), fc.constantFrom(...'{}[]":,\\0123456789-+.eE \n\ttrufalsn\u0000\u001f\'/x'))
    fc.assert(fc.property(fc.array(fc.tuple(fc.nat(), fc.nat({ max: 2 }), fc.constantFrom(...'{}[]":,\\u01-+.eE \n\ttn\u0001\'')), { minLength: 1, maxLength: 3 }), damage, (more, [text, place, cut, inserted]) => {
      let damaged = text
      for (const [at, length, character] of [[place, cut, inserted] as const, ...more]) {
        const offset = at % (damaged.length + 1)
        damaged = damaged.slice(0, offset) + character + damaged.slice(offset + length)
      }
      expect(isScanned(damaged), damaged).toBe(isParsed(damaged))
    }), { numRuns: 5_000 })
  })

  function isParsed(text: string): boolean {
    try {
      JSON.parse(text)
      return true
    } catch {
      return false
    }
  }

  function isScanned(text: string): boolean {
    try {
      scanJson(text, { depth: 32, listMember: 'readings' })
      return true
    } catch (error) {
      if (error instanceof JsonSyntaxFault) return false
      throw error
    }
  }
})

describe('the place in a text', () => {
  it.each([
    ['abc', 2, 'line 1, column 3'],
    ['a\nb', 2, 'line 2, column 1'],
    ['a\r\nb', 3, 'line 2, column 1'],
    ['a\rb', 2, 'line 2, column 1'],
  ])('%j at %i', (text, offset, place) => {
    expect(placeInText(text, offset)).toBe(place)
  })
})
