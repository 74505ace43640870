import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { countPlaywright, countVitest, sum, summaryLine } from '../../../server/commands/setup/counts.mjs'

const folder = mkdtempSync(join(tmpdir(), 'coldslip-counts-'))
afterAll(() => rmSync(folder, { recursive: true }))

function report(content: unknown): string {
  const file = join(folder, `${Math.random()}.json`)
  writeFileSync(file, typeof content === 'string' ? content : JSON.stringify(content))
  return file
}

const vitestReport = (part: object) => report({ numPassedTests: 0, numFailedTests: 0, numPendingTests: 0, numTodoTests: 0, testResults: [], ...part })

describe('countVitest', () => {
  it('counts passed, failed and skipped tests', () => {
    expect(countVitest(vitestReport({ numPassedTests: 7, numFailedTests: 2, numPendingTests: 1, testResults: [{ status: 'failed', assertionResults: [{ status: 'failed' }] }] }), 1))
      .toEqual({ passed: 7, failed: 2, skipped: 1 })
  })

  it('counts a file that could not be loaded as one failure', () => {
    expect(countVitest(vitestReport({ numPassedTests: 7, testResults: [{ status: 'failed', assertionResults: [] }] }), 1)).toEqual({ passed: 7, failed: 1, skipped: 0 })
  })

  it('does not call a run good that ended badly, ran nothing or left no report', () => {
    expect(countVitest(vitestReport({ numPassedTests: 7 }), 1).failed).toBe(1)
    expect(countVitest(vitestReport({}), 0).failed).toBe(1)
    expect(countVitest(join(folder, 'none.json'), 0).failed).toBe(1)
    expect(countVitest(report('{ cut off'), 0).failed).toBe(1)
  })
})

describe('countPlaywright', () => {
  it('counts a test that passed at the second try as failed', () => {
    expect(countPlaywright(report({ stats: { expected: 5, unexpected: 1, flaky: 1, skipped: 2 } }), 1)).toEqual({ passed: 5, failed: 2, skipped: 2 })
  })

  it('does not call a run good that ran nothing', () => {
    expect(countPlaywright(report({ stats: { expected: 0, unexpected: 0, flaky: 0, skipped: 0 } }), 0).failed).toBe(1)
  })
})

describe('summaryLine', () => {
  it('is the sum of all parts in the one form that scripts read', () => {
    expect(summaryLine(sum([{ passed: 3, failed: 0, skipped: 1 }, { passed: 4, failed: 2, skipped: 0 }]))).toBe('7 passed, 2 failed')
  })
})
