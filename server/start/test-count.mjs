/** @typedef {{passed: number, failed: number}} Count */

/**
 * What a run of vitest comes to. A run that ended badly counts one failure at least, whatever its report says:
 * a file that does not load has no tests that could fail, and a broken run leaves no report.
 * @param {{numPassedTests?: number, numTotalTests?: number, numPendingTests?: number} | null} report
 * @param {number} exitCode
 * @returns {Count}
 */
export function countOf(report, exitCode) {
  const passed = report?.numPassedTests ?? 0;
  // A test that was skipped was not passed, and this project has none that may be.
  const failed = (report?.numTotalTests ?? 0) - passed;
  const endedBadly = exitCode !== 0 || passed === 0;
  return { passed, failed: failed === 0 && endedBadly ? 1 : failed };
}

/** @param {Count[]} counts */
export function closingLine(counts) {
  const sum = (/** @type {keyof Count} */ name) => counts.reduce((total, count) => total + count[name], 0);
  return `${sum('passed')} passed, ${sum('failed')} failed`;
}
