import { readFileSync, readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { decode } from './samples'

const folder = new URL('../../../fixtures/intake/', import.meta.url)
const MEDIA_TYPES: Record<string, string> = { csv: 'text/csv', json: 'application/json', ndjson: 'application/x-ndjson' }

function decodeFile(name: string) {
  return decode(readFileSync(new URL(name, folder)), { mediaType: MEDIA_TYPES[name.split('.').at(-1)!]! })
}

const good = {
  'good/comma-utf8-mark.csv': 2,
  'good/semicolon-decimal-comma.csv': 2,
  'good/tab-mixed-line-ends.csv': 3,
  'good/windows-1252.csv': 1,
  'good/utf-16le.csv': 2,
  'good/extra-columns.csv': 2,
  'good/one.json': 1,
  'good/many.json': 3,
  'good/blank-lines.ndjson': 2,
}

const failing = {
  'bad/no-header.csv': 'header',
  'bad/column-twice.csv': 'duplicate-column',
  'bad/workbook.csv': 'workbook',
  'bad/cut.json': 'syntax',
  'bad/not-utf8.json': 'encoding',
}

const partly: Record<string, { taken: number, refused: [line: number, code: string][] }> = {
  'bad/open-quote.csv': { taken: 98, refused: [[3, 'quote']] },
  'bad/cells.csv': { taken: 2, refused: [[3, 'number'], [4, 'unknown-substance'], [5, 'time'], [6, 'column-count']] },
  'bad/lines.ndjson': { taken: 2, refused: [[2, 'syntax'], [3, 'duplicate-member'], [4, 'bad-character']] },
}

describe('files as they come', () => {
  it.each(Object.entries(good))('%s is taken whole', async (name, count) => {
    const { readings, refusals, failure } = await decodeFile(name)
    expect({ refusals, failure }).toEqual({ refusals: [], failure: undefined })
    expect(readings.map(({ id }) => id)).toEqual(Array.from({ length: count }, (_, index) => `f-${index + 1}`))
  })

  it.each(Object.entries(failing))('%s fails', async (name, code) => {
    expect((await decodeFile(name)).failure).toMatchObject({ code })
  })

  it.each(Object.entries(partly))('%s is taken in part', async (name, { taken, refused }) => {
    const { readings, refusals } = await decodeFile(name)
    expect(readings).toHaveLength(taken)
    expect(refusals.map(({ line, code }) => [line, code])).toEqual(refused)
  })

  it('are all listed here', () => {
    const files = ['good', 'bad'].flatMap(part => readdirSync(new URL(`${part}/`, folder)).map(file => `${part}/${file}`))
    expect(files.sort()).toEqual([...Object.keys(good), ...Object.keys(failing), ...Object.keys(partly)].sort())
  })
})
