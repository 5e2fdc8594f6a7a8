import { mkdtempSync, rmSync, writeFileSync } from "node:fs"
import { tmpdir } from "node:os"
import { join } from "node:path"
import { afterEach, beforeEach, describe, expect, it } from "vitest"
import { inWords, ofCheck, ofPlaywright, ofVitest, sum } from "../../../scripts/lib/test-counts.mjs"

let folder: string
beforeEach(() => {
	folder = mkdtempSync(join(tmpdir(), "waxbill-counts-"))
})
afterEach(() => rmSync(folder, { recursive: true, force: true }))

function report(content: unknown): string {
	const file = join(folder, "report.json")
	writeFileSync(file, typeof content === "string" ? content : JSON.stringify(content))
	return file
}

const vitest = (more: object) =>
	report({ numPassedTests: 0, numFailedTests: 0, numPendingTests: 0, numTodoTests: 0, testResults: [], ...more })

describe("the counts of a suite", () => {
	it("are those of the report", () => {
		const file = vitest({
			numPassedTests: 7,
			numFailedTests: 2,
			numPendingTests: 1,
			numTodoTests: 1,
			testResults: [{ status: "failed", assertionResults: [{ status: "failed" }, { status: "failed" }] }],
		})
		expect(ofVitest(file, 1)).toEqual({ passed: 7, failed: 2, skipped: 2 })
		expect(ofPlaywright(report({ stats: { expected: 4, unexpected: 1, flaky: 0, skipped: 3 } }), 1)).toEqual({
			passed: 4,
			failed: 1,
			skipped: 3,
		})
	})

	it("count a file that broke before its first test as a failure", () => {
		const file = vitest({ numPassedTests: 3, testResults: [{ status: "failed", assertionResults: [] }] })
		expect(ofVitest(file, 1)).toEqual({ passed: 3, failed: 1, skipped: 0 })
	})

	it("count a browser test that passed only when repeated as a failure", () => {
		expect(ofPlaywright(report({ stats: { expected: 1, unexpected: 0, flaky: 2, skipped: 0 } }), 0).failed).toBe(2)
	})

	it("count as one failure when no test ran, the report is missing or half written, or the end is unexplained", () => {
		const failure = { passed: 0, failed: 1, skipped: 0 }
		expect(ofVitest(vitest({}), 0)).toEqual(failure)
		expect(ofVitest(join(folder, "none.json"), 0)).toEqual(failure)
		expect(ofPlaywright(report('{ "stats": { "exp'), 0)).toEqual(failure)
		expect(ofVitest(vitest({ numPassedTests: 5 }), 1)).toEqual({ passed: 5, failed: 1, skipped: 0 })
	})

	it("are one for a check", () => {
		expect(ofCheck(0)).toEqual({ passed: 1, failed: 0, skipped: 0 })
		expect(ofCheck(2)).toEqual({ passed: 0, failed: 1, skipped: 0 })
	})
})

describe("the last line", () => {
	it("is the sum, and names what was skipped only where something was", () => {
		const passed = { passed: 2, failed: 0, skipped: 0 }
		expect(inWords(sum([passed, passed]))).toBe("4 passed, 0 failed")
		expect(inWords(sum([passed, { passed: 1, failed: 3, skipped: 2 }]))).toBe("3 passed, 3 failed, 2 skipped")
	})
})
