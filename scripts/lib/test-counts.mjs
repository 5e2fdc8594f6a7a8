import { existsSync, readFileSync } from "node:fs"

/** Counts of one suite: `{ passed, failed, skipped }`. */
const counts = (passed, failed, skipped = 0) => ({ passed, failed, skipped })

/** A check that counts no tests is one, which passed or failed. */
export function ofCheck(exitCode) {
	return exitCode === 0 ? counts(1, 0) : counts(0, 1)
}

/** The counts in the JSON report that Vitest wrote to `file`; see `honest` for what `exitCode` does. */
export function ofVitest(file, exitCode) {
	const report = readReport(file)
	if (!report) return honest(counts(0, 0), exitCode)
	// A file that fails before its first test has no tests to count, and is one failure itself.
	const broken = report.testResults.filter(
		(result) => result.status === "failed" && !result.assertionResults.some((test) => test.status === "failed"),
	).length
	const skipped = report.numPendingTests + report.numTodoTests
	return honest(counts(report.numPassedTests, report.numFailedTests + broken, skipped), exitCode)
}

/** The counts in the JSON report that Playwright wrote to `file`; see `honest` for what `exitCode` does. */
export function ofPlaywright(file, exitCode) {
	const report = readReport(file)
	if (!report) return honest(counts(0, 0), exitCode)
	// A test that passes only when repeated has failed.
	const { expected, unexpected, flaky, skipped } = report.stats
	return honest(counts(expected, unexpected + flaky, skipped), exitCode)
}

/** A suite that ran no test, or that ended badly without naming a failed test, counts as one failure. */
function honest({ passed, failed, skipped }, exitCode) {
	const isUnexplained = failed === 0 && (exitCode !== 0 || passed === 0)
	return counts(passed, failed + (isUnexplained ? 1 : 0), skipped)
}

function readReport(file) {
	if (!existsSync(file)) return undefined
	try {
		return JSON.parse(readFileSync(file, "utf8"))
	} catch {
		// Half a report is what a crash leaves.
		return undefined
	}
}

/** The counts of several suites together. */
export function sum(all) {
	return all.reduce((a, b) => counts(a.passed + b.passed, a.failed + b.failed, a.skipped + b.skipped), counts(0, 0))
}

/** "N passed, N failed", with ", N skipped" where any were. */
export function inWords({ passed, failed, skipped }) {
	return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ""}`
}
