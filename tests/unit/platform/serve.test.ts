import { expect, it } from "vitest"
import { startModule } from "../../setup/run-script"

/** A server that answers /slow when it is told to stop, so that one request is under way at that moment. */
const server = (port: number) => `
	import express from "express"
	import { listen } from "./app/platform/serve.server.ts"
	const app = express()
	app.get("/slow", (request, response) => {
		console.log("asked")
		process.once("SIGTERM", () => setTimeout(() => response.send("in full"), 200))
	})
	listen(app, { host: "127.0.0.1", port: ${port} }, async () => console.log("pool closed"))
`

it("at a stop, requests under way are answered, then the pool is closed", async () => {
	const { anyPort } = await import("../../../scripts/lib/ports.mjs")
	const port = await anyPort()
	const script = startModule(`${server(port)}`, { NODE_OPTIONS: "--import tsx" })
	await script.says(/"msg":"listening"/)
	const answer = fetch(`http://127.0.0.1:${port}/slow`).then((response) => response.text())
	await script.says(/asked/)
	script.process.kill("SIGTERM")
	expect(await answer).toBe("in full")
	expect(await script.ended).toBe(0)
	expect(script.output()).toMatch(/pool closed\n$/)
})
