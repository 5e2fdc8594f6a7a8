import { existsSync, mkdtempSync, readFileSync, rmSync } from "node:fs"
import { tmpdir } from "node:os"
import { join } from "node:path"
import { afterEach, beforeEach, expect, it } from "vitest"
import { startModule } from "../../setup/run-script"

let folder: string
beforeEach(() => {
	folder = mkdtempSync(join(tmpdir(), "waxbill-crew-"))
})
afterEach(() => rmSync(folder, { recursive: true, force: true }))

/** A script that keeps one member running `code`, and says so. */
const keeping = (code: string) => `
	import { supervise } from "./scripts/lib/crew.mjs"
	await supervise(${JSON.stringify(folder)}, async (crew) => {
		crew.onStop(() => console.log("undone"))
		const member = crew.start("mail catcher", process.execPath, ["-e", ${JSON.stringify(code)}])
		console.log("member " + member.pid)
		await crew.ended
	}, { signalCode: 0 })
`
const forEver = `setInterval(() => {}, 1000)`

const memberOf = (output: string) => Number(/member (\d+)/.exec(output)?.[1])

/** Whether the process runs; one that has ended and that nobody has asked after does not. */
function isRunning(pid: number): boolean {
	const file = `/proc/${pid}/stat`
	return existsSync(file) && !/\) Z/.test(readFileSync(file, "utf8"))
}

it("a signal stops the members and undoes the rest", async () => {
	const script = startModule(keeping(forEver))
	await script.says(/member/)
	script.process.kill("SIGINT")
	expect(await script.ended).toBe(0)
	expect(isRunning(memberOf(script.output()))).toBe(false)
	expect(script.output()).toMatch(/Stopping\nundone\n$/)
	expect(existsSync(join(folder, "run.json"))).toBe(false)
})

it("a member that ends by itself is named with its last words, and all is stopped", async () => {
	const script = startModule(keeping(`console.error("no room left"); process.exit(3)`))
	expect(await script.ended).toBe(1)
	expect(script.output()).toMatch(/The mail catcher ended by itself \(exit code 3\), so everything was stopped\./)
	expect(script.output()).toMatch(/no room left\nundone\n$/)
})

it("a second script in the same folder is refused and disturbs nothing", async () => {
	const first = startModule(keeping(forEver))
	await first.says(/member/)
	const second = startModule(keeping(forEver))
	expect(await second.ended).toBe(1)
	expect(second.output()).toBe(
		`Waxbill runs from this folder already (process ${first.process.pid}): stop that first.\n`,
	)
	expect(JSON.parse(readFileSync(join(folder, "run.json"), "utf8")).pid).toBe(first.process.pid)
	expect(isRunning(memberOf(first.output()))).toBe(true)
	first.process.kill("SIGTERM")
	await first.ended
})

it("what a killed script left running is ended by the next one", async () => {
	const killed = startModule(keeping(forEver))
	await killed.says(/member/)
	killed.process.kill("SIGKILL")
	await killed.ended
	const left = memberOf(killed.output())
	expect(isRunning(left)).toBe(true)

	const next = startModule(keeping(forEver))
	await next.says(/member/)
	expect(isRunning(left)).toBe(false)
	next.process.kill("SIGTERM")
	await next.ended
})

it("what a member started ends along with it, even if it does not listen to a polite signal", async () => {
	const deaf = `process.on("SIGTERM", () => {}); console.log("up"); setInterval(() => {}, 1000)`
	const withChild = `
		const child = require("node:child_process").spawn(process.execPath, ["-e", ${JSON.stringify(deaf)}])
		child.stdout.once("data", () => require("node:fs").writeFileSync(${JSON.stringify(join(folder, "child"))}, "pid " + child.pid + "."))
	`
	const script = startModule(keeping(withChild))
	const childOf = () => Number(/pid (\d+)\./.exec(readFileSync(join(folder, "child"), "utf8"))?.[1])
	await expect.poll(() => existsSync(join(folder, "child")) && childOf(), { timeout: 15_000 }).toBeGreaterThan(0)
	const grandchild = childOf()
	script.process.kill("SIGTERM")
	await script.ended
	await expect.poll(() => isRunning(grandchild)).toBe(false)
})
