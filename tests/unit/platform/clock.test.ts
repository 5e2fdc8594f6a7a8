import { mkdtempSync, rmSync, writeFileSync } from "node:fs"
import { tmpdir } from "node:os"
import { join } from "node:path"
import { afterAll, beforeAll, expect, test, vi } from "vitest"
import { now } from "~/platform/clock.server"

const folder = mkdtempSync(join(tmpdir(), "clock-"))
const file = vi.hoisted(() => ({ name: "" }))
vi.mock("~/platform/env.server", () => ({
	env: {
		get TEST_CLOCK_FILE() {
			return file.name || undefined
		},
	},
}))

beforeAll(() => {
	vi.useFakeTimers({ toFake: ["Date"], now: new Date("2026-08-13T18:15:00Z") })
})
afterAll(() => {
	vi.useRealTimers()
	rmSync(folder, { recursive: true })
})

test("the clock is the machine's", () => {
	expect(now().toISOString()).toBe("2026-08-13T18:15:00.000Z")
})

test("a test moves it for every process that reads the same file", () => {
	file.name = join(folder, "clock")
	expect(now().toISOString()).toBe("2026-08-13T18:15:00.000Z")
	writeFileSync(file.name, "86400000\n")
	expect(now().toISOString()).toBe("2026-08-14T18:15:00.000Z")
	writeFileSync(file.name, "tomorrow")
	expect(() => now()).toThrow(RangeError)
})
