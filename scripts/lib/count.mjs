/** Counts, from the reports that the runners themselves wrote. Nothing here knows how many tests there should be. */

/**
 * @typedef {object} Count
 * @property {number} passed
 * @property {number} failed
 * @property {number} skipped
 * @property {string} [why] one sentence when something failed that no single test shows
 */

/**
 * @param {string | null} report the text of a Vitest JSON report, null when the runner wrote none
 * @param {number} exitCode how the runner ended
 * @returns {Count}
 */
export function countTests(report, exitCode) {
  const data = parse(report)
  if (!data || !Array.isArray(data.testResults)) return failedOnce('The runner crashed: it wrote no report.')
  const passed = data.numPassedTests
  const skipped = data.numPendingTests + data.numTodoTests
  // A file can fail without a failed test in it: it could not be loaded, or its set-up or clean-up threw.
  const brokenFiles = data.testResults.filter(
    (file) => file.status === 'failed' && !file.assertionResults.some((test) => test.status === 'failed'),
  ).length
  const failed = data.numFailedTests + brokenFiles
  if (failed > 0) return { passed, failed, skipped, ...(brokenFiles ? { why: brokenFilesSentence(brokenFiles) } : {}) }
  if (passed === 0) return { ...failedOnce('The runner ran no test.'), skipped }
  if (exitCode !== 0 || data.success !== true) {
    return { passed, failed: 1, skipped, why: 'Every test passed, yet the runner met an error outside of them.' }
  }
  return { passed, failed, skipped }
}

const brokenFilesSentence = (count) => `${count} test file${count === 1 ? '' : 's'} failed outside of any test.`

/**
 * @param {string | null} report the text of an ESLint JSON report
 * @param {number} exitCode
 * @returns {Count & { messages: string[] }} nothing passed, and one failed when there is any error
 */
export function countLint(report, exitCode) {
  const files = parse(report)
  if (!Array.isArray(files)) return { ...failedOnce('ESLint crashed: it wrote no report.'), messages: [] }
  const messages = files.flatMap((file) =>
    file.messages.map(
      ({ line, column, severity, message, ruleId }) =>
        `${file.filePath}:${line ?? 0}:${column ?? 0} ${severity === 2 ? 'error' : 'warning'} ${message} (${ruleId ?? 'syntax'})`,
    ),
  )
  const errors = files.reduce((sum, file) => sum + file.errorCount, 0)
  if (errors > 0) return { ...failedOnce(`ESLint found ${errors} error${errors === 1 ? '' : 's'}.`), messages }
  if (exitCode !== 0) return { ...failedOnce(`ESLint ended with ${exitCode}.`), messages }
  return { passed: 0, failed: 0, skipped: 0, messages }
}

/** @returns {Count} for a step that is no test: it adds nothing unless it fails. */
export function failedOnce(why) {
  return { passed: 0, failed: 1, skipped: 0, why }
}

/** @param {Count[]} counts */
export function sum(counts) {
  const total = { passed: 0, failed: 0, skipped: 0 }
  for (const count of counts) for (const key of Object.keys(total)) total[key] += count[key]
  return total
}

/** The last line of `npm test`. */
export function countLine({ passed, failed, skipped }) {
  return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`
}

function parse(text) {
  try {
    return JSON.parse(text ?? '')
  } catch {
    return null
  }
}
