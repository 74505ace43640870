import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { ownPath } from '../../../app/utils/own-path'

describe('ownPath', () => {
  it.each(['/readings', '/readings?verdict=isolate&open=1', '/intake/abc#refused', '/', '/a//b', '/readings?next=//x'])('keeps %s', (path) => {
    expect(ownPath(path)).toBe(path)
  })

  it.each(['//evil.example', '///evil.example', 'https://evil.example', 'javascript:alert(1)', '/\\evil.example', '\\\\evil.example', '/\t/evil.example', '/\n/evil.example', '', 'readings', ' /readings', undefined, null, ['/readings'], '/sign-in', '/sign-in?next=/sign-in'])('leads to the bench instead of %j', (wish) => {
    expect(ownPath(wish)).toBe('/bench')
  })

  it('never leaves the site, whatever is asked', () => {
    fc.assert(fc.property(fc.oneof(fc.string(), fc.string({ unit: fc.constantFrom('/', '\\', ':', '\t', '\n', '@', 'e', '?', '#', '.') })), (wish) => {
      expect(new URL(ownPath(wish), 'https://own.example').origin).toBe('https://own.example')
      expect(new URL(ownPath(`/${wish}`), 'https://own.example').origin).toBe('https://own.example')
    }))
  })
})
