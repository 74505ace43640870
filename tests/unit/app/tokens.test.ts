import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { contrast, difference, linearRgb, seenWith, VISIONS } from './colour'

const css = readFileSync(new URL('../../../app/assets/css/tokens.css', import.meta.url), 'utf8')

function block(start: string): Record<string, string> {
  const from = css.indexOf(start)
  expect(from, start).toBeGreaterThan(-1)
  const body = css.slice(css.indexOf('{', from) + 1, css.indexOf('}', from))
  return Object.fromEntries([...body.matchAll(/--([a-z-]+):\s*([^;]+);/g)].map(found => [found[1], found[2]]))
}

const light = block(':root {')
const dark = block(':root[data-theme=\'dark\'] {')
const print = block(':root:root:root {')
const verdicts = ['verdict-connect', 'verdict-purge', 'verdict-again', 'verdict-isolate', 'verdict-flammable']

it('the system\'s dark and the chosen dark are the same', () => {
  expect(block(':root:not([data-theme=\'light\']) {')).toEqual(dark)
})

it('both themes carry the same tokens', () => {
  expect(Object.keys(dark)).toEqual(Object.keys(light))
})

describe.each([['light', light], ['dark', dark], ['print', { ...light, ...print }]])('%s', (_, tokens) => {
  it.each(verdicts)('%s is AAA text on sheet and on frost, also as the ground of sheet-coloured words', (name) => {
    expect(contrast(tokens[name]!, tokens.sheet!)).toBeGreaterThanOrEqual(7)
    expect(contrast(tokens[name]!, tokens.frost!)).toBeGreaterThanOrEqual(7)
  })

  it.each(['ink', 'ink-soft', 'copper'])('%s is AA text on every ground', (name) => {
    for (const ground of ['sheet', 'frost', 'copper-wash']) {
      expect(contrast(tokens[name]!, tokens[ground]!), ground).toBeGreaterThanOrEqual(4.5)
    }
  })

  it('words on copper are AA', () => {
    expect(contrast(tokens['on-copper']!, tokens.copper!)).toBeGreaterThanOrEqual(4.5)
  })

  it('edges of fields and the focus ring stand out from what is beside them (WCAG 2.2, 1.4.11)', () => {
    for (const name of ['rule-strong', 'copper']) {
      for (const ground of ['sheet', 'frost']) expect(contrast(tokens[name]!, tokens[ground]!), `${name} on ${ground}`).toBeGreaterThanOrEqual(3)
    }
  })

  it.each(Object.keys(VISIONS) as (keyof typeof VISIONS)[])('verdict inks stay apart with %s vision', (vision) => {
    const seen = verdicts.map(name => seenWith(vision, linearRgb(tokens[name]!)))
    for (const [index, one] of seen.entries()) {
      for (const [other, two] of seen.entries()) {
        if (other > index) expect(difference(one, two), `${verdicts[index]} and ${verdicts[other]}`).toBeGreaterThanOrEqual(12)
      }
    }
  })
})
