import { once } from "node:events"
import { type AddressInfo, createServer, type Server } from "node:net"
import { afterEach, expect, it } from "vitest"
import { startModule } from "../../setup/run-script"

const chooses = `
	import { webPort } from "./scripts/lib/ports.mjs"
	import { explain } from "./scripts/lib/say.mjs"
	try { console.log(await webPort()) } catch (error) { explain(error); process.exitCode = 1 }
`

let taken: Server | undefined
afterEach(() => void taken?.close())

async function takeAPort(): Promise<number> {
	taken = createServer().listen(0, "127.0.0.1")
	await once(taken, "listening")
	return (taken.address() as AddressInfo).port
}

it("a port that is asked for by number and taken is one sentence", async () => {
	const port = await takeAPort()
	const script = startModule(chooses, { PORT: String(port) })
	expect(await script.ended).toBe(1)
	expect(script.output()).toBe(`Port ${port} is taken by another program: stop that, or choose another PORT.\n`)
})

it.each(["http", "0", "70000", "-1", "80.5"])("PORT=%s is refused", async (port) => {
	const script = startModule(chooses, { PORT: port })
	expect(await script.ended).toBe(1)
	expect(script.output()).toBe(`PORT must be a number from 1 to 65535, not "${port}".\n`)
})

it("a port that nobody asked for moves up past what is taken and what is given out", async () => {
	const port = await takeAPort()
	const script = startModule(`
		import { freePort } from "./scripts/lib/ports.mjs"
		console.log([await freePort(${port}), await freePort(${port})].join(" "))
	`)
	expect(await script.ended).toBe(0)
	const [first = 0, second = 0] = script.output().trim().split(" ").map(Number)
	expect(first).toBeGreaterThan(port)
	expect(second).toBeGreaterThan(first)
})
