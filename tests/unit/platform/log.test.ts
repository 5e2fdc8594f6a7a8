import { createServer } from "node:http"
import type { AddressInfo } from "node:net"
import express from "express"
import { afterEach, describe, expect, it } from "vitest"
import { loggablePath, requestLog } from "~/platform/log.server"

let stop: (() => Promise<void>) | undefined
afterEach(async () => {
	await stop?.()
	stop = undefined
})

describe("paths in the log", () => {
	it.each([
		["/buy/harrow-hill/orders?code=123456", "/buy/harrow-hill/orders"],
		["/sign-in/link/abc", "/sign-in/link/…"],
		["/invitation/abc.data", "/invitation/…"],
		["/orders/k3JkX0pQz8a9sD7fG6hJ5kL4mN3bV2cX1", "/orders/…"],
		["/orders/0b7c1e0e-6c0f-4c61-9d51-0c5d8a8f6f10", "/orders/0b7c1e0e-6c0f-4c61-9d51-0c5d8a8f6f10"],
		["/assets/entry.client-D4tP0q1wE8rT5yU2iO9pA3sD6fG.js", "/assets/entry.client-D4tP0q1wE8rT5yU2iO9pA3sD6fG.js"],
		["/", "/"],
	])("%s is logged as %s", (url, logged) => {
		expect(loggablePath(url)).toBe(logged)
	})
})

describe("the request log", () => {
	it("tells method, path, status, time and id, and nothing that was sent", async () => {
		const lines: unknown[] = []
		const app = express()
		app.use(requestLog({ info: (line: unknown) => lines.push(line), warn: (line: unknown) => lines.push(line) }))
		app.post("/sign-in", (request, response) => void response.status(422).send(request.get("x-request-id")))
		const server = createServer(app).listen(0, "127.0.0.1")
		stop = () => new Promise((resolve) => server.close(() => resolve()))
		await new Promise((resolve) => server.once("listening", resolve))
		const { port } = server.address() as AddressInfo

		const response = await fetch(`http://127.0.0.1:${port}/sign-in?next=%2Fdesk`, {
			method: "POST",
			headers: { cookie: "session=topsecret", "x-request-id": "chosen-by-the-client" },
			body: new URLSearchParams({ code: "123456", email: "ann@example.test" }),
		})
		const seenByApplication = await response.text()

		expect(lines).toEqual([
			{ requestId: seenByApplication, method: "POST", path: "/sign-in", status: 422, ms: expect.any(Number) },
		])
		expect(response.headers.get("x-request-id")).toBe(seenByApplication)
		expect(seenByApplication).toMatch(/^[0-9a-f-]{36}$/)
	})
})
