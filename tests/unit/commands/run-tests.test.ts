import { describe, expect, it } from 'vitest'
import { parseArguments } from '../../../server/commands/setup/run-tests.mjs'

describe('parseArguments', () => {
  it('runs every part, or those that are named, in the fixed order', () => {
    expect(parseArguments([]).parts).toEqual(['lint', 'types', 'unit', 'database', 'http', 'browser'])
    expect(parseArguments(['http', 'unit'])).toEqual({ parts: ['unit', 'http'], filters: [] })
  })

  it('hands files to the one part before them', () => {
    expect(parseArguments(['http', 'tests/http/intake.test.ts'])).toEqual({ parts: ['http'], filters: ['tests/http/intake.test.ts'] })
    expect(() => parseArguments(['tests/http/intake.test.ts'])).toThrow('need the one part')
  })

  it('names a part that is not there', () => {
    expect(() => parseArguments(['units'])).toThrow('There is no part "units"')
  })
})
