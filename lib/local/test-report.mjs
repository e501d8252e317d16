// @ts-check
import { readFileSync } from 'node:fs'

/** @typedef {{ passed: number, failed: number, skipped: number }} Tally */

/**
 * What vitest's JSON report counts. A file that could not be loaded, an error outside any test, no test at all or no
 * report is a failure too, never nothing.
 * @param {string} file @param {number | null} code vitest's exit code
 * @returns {Tally}
 */
export function tallyOf(file, code) {
  const report = readReport(file)
  if (!report) return { passed: 0, failed: 1, skipped: 0 }
  const broken = report.testResults.filter(
    ({ status, assertionResults }) => status === 'failed' && !assertionResults.some((test) => test.status === 'failed'),
  )
  const passed = report.numPassedTests
  const skipped = report.numPendingTests + report.numTodoTests
  const failed = report.numFailedTests + broken.length
  const hidden = failed === 0 && (code !== 0 || passed === 0)
  return { passed, failed: hidden ? 1 : failed, skipped }
}

/**
 * @typedef {{ status: string, assertionResults: { status: string }[] }} FileReport
 * @typedef {{ numPassedTests: number, numFailedTests: number, numPendingTests: number, numTodoTests: number, testResults: FileReport[] }} Report
 * @param {string} file @returns {Report | undefined}
 */
function readReport(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'))
  } catch {
    return undefined // vitest ended before it could write one
  }
}

/** @param {Tally[]} tallies @returns {Tally} */
export function sum(tallies) {
  const total = { passed: 0, failed: 0, skipped: 0 }
  for (const tally of tallies) {
    total.passed += tally.passed
    total.failed += tally.failed
    total.skipped += tally.skipped
  }
  return total
}

/** The last line of a test run. @param {Tally} tally */
export function sentence({ passed, failed, skipped }) {
  return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`
}
