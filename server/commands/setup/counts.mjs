import { existsSync, readFileSync } from 'node:fs'

/**
 * @typedef {{ passed: number, failed: number, skipped: number }} Counts
 */

/** Nothing ran, or it broke in a way that no test shows: that is a failure too. */
const BROKEN = { passed: 0, failed: 1, skipped: 0 }

function readReport(file) {
  try {
    return existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : null
  } catch {
    return null
  }
}

/** A run that ended badly never counts as all passed, and one without a single test is a failure. */
function honest(counts, exitCode) {
  if (counts.failed > 0) return counts
  return exitCode !== 0 || counts.passed === 0 ? { ...counts, failed: 1 } : counts
}

/** @returns {Counts} of a vitest JSON report; a file that could not be loaded counts as one failed */
export function countVitest(file, exitCode) {
  const report = readReport(file)
  if (!report) return BROKEN
  const unloadable = report.testResults.filter(suite => suite.status === 'failed' && suite.assertionResults.every(test => test.status !== 'failed')).length
  return honest({
    passed: report.numPassedTests,
    failed: report.numFailedTests + unloadable,
    skipped: report.numPendingTests + (report.numTodoTests ?? 0),
  }, exitCode)
}

/** @returns {Counts} of a Playwright JSON report; a test that failed at first is failed */
export function countPlaywright(file, exitCode) {
  const report = readReport(file)
  if (!report) return BROKEN
  const { expected, unexpected, flaky, skipped } = report.stats
  return honest({ passed: expected, failed: unexpected + flaky, skipped }, exitCode)
}

/** @returns {Counts} of a check that is one whole, such as lint */
export function countCheck(exitCode) {
  return exitCode === 0 ? { passed: 1, failed: 0, skipped: 0 } : BROKEN
}

/** @param {Counts[]} all */
export function sum(all) {
  return all.reduce((total, one) => ({
    passed: total.passed + one.passed,
    failed: total.failed + one.failed,
    skipped: total.skipped + one.skipped,
  }), { passed: 0, failed: 0, skipped: 0 })
}

/** The last line of a test run. @param {Counts} counts */
export function summaryLine({ passed, failed }) {
  return `${passed} passed, ${failed} failed`
}
