/**
 * @typedef {object} Counts
 * @property {number} passed
 * @property {number} failed
 * @property {number} skipped
 *
 * @typedef {{ status: string, assertionResults: { status: string }[] }} VitestFile
 * @typedef {{ numPassedTests: number, numFailedTests: number, numPendingTests: number, numTodoTests: number,
 *   testResults: VitestFile[] }} VitestReport
 * @typedef {{ stats: { expected: number, unexpected: number, flaky: number, skipped: number } }} PlaywrightReport
 */

/**
 * One check that passed or failed as a whole.
 * @param {boolean} ok
 * @returns {Counts}
 */
export function oneCheck(ok) {
	return { passed: ok ? 1 : 0, failed: ok ? 0 : 1, skipped: 0 };
}

/**
 * @param {Counts[]} all
 * @returns {Counts}
 */
export function sum(all) {
	return all.reduce(
		(total, { passed, failed, skipped }) => ({
			passed: total.passed + passed,
			failed: total.failed + failed,
			skipped: total.skipped + skipped
		}),
		{ passed: 0, failed: 0, skipped: 0 }
	);
}

/**
 * Counts of Vitest's JSON report. A file that could not be loaded has no tests in it and counts as one failure.
 * @param {VitestReport} report
 * @returns {Counts}
 */
export function countVitest(report) {
	const broken = report.testResults.filter(
		({ status, assertionResults }) =>
			status === 'failed' && !assertionResults.some((test) => test.status === 'failed')
	);
	return {
		passed: report.numPassedTests,
		failed: report.numFailedTests + broken.length,
		skipped: report.numPendingTests + report.numTodoTests
	};
}

/**
 * Counts of Playwright's JSON report. A journey that passed only when it was tried again counts as failed.
 * @param {PlaywrightReport} report
 * @returns {Counts}
 */
export function countPlaywright({ stats }) {
	return { passed: stats.expected, failed: stats.unexpected + stats.flaky, skipped: stats.skipped };
}

/**
 * Counts of a program that closes with a line `N passed, N failed`; the last such line counts.
 * @param {string} output
 * @returns {Counts}
 */
export function countLine(output) {
	const found = [...output.matchAll(/^(\d+) passed, (\d+) failed(?:, (\d+) skipped)?\s*$/gm)].at(-1);
	if (!found) {
		throw new Error('The output has no line of the form "N passed, N failed".');
	}
	return { passed: Number(found[1]), failed: Number(found[2]), skipped: Number(found[3] ?? 0) };
}

/**
 * What a program that ended with this code adds up to. A program that failed has at least one failure, also when it
 * broke off before it could count.
 * @param {number} code
 * @param {() => Counts} read reads its counts, and throws when there are none
 * @returns {Counts}
 */
export function countsOf(code, read) {
	try {
		const counts = read();
		const silent = code !== 0 && counts.failed === 0;
		return silent ? { ...counts, failed: 1 } : counts;
	} catch (error) {
		console.error(`No counts could be read: ${error instanceof Error ? error.message : String(error)}`);
		return { passed: 0, failed: 1, skipped: 0 };
	}
}

/**
 * The closing line.
 * @param {Counts} counts
 */
export function closingLine({ passed, failed, skipped }) {
	return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`;
}
