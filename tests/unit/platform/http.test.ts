import { once } from "node:events"
import { request, type Server } from "node:http"
import type { AddressInfo } from "node:net"
import express from "express"
import { afterEach, beforeEach, expect, it, vi } from "vitest"
import { bodyLimit, clientAddress, lastResort, securityHeaders } from "~/platform/http.server"
import { log } from "~/platform/log.server"

let server: Server
let origin: string
let reached: number

async function serve(options: { https?: boolean; hops?: number } = {}): Promise<void> {
	const app = express()
	app.set("trust proxy", options.hops ?? 0)
	app.use(clientAddress, securityHeaders(options.https ?? false), bodyLimit)
	app.get("/broken", () => {
		throw new Error("the password is swordfish")
	})
	app.use((incoming, response) => {
		reached += 1
		incoming.resume()
		response.json({ address: incoming.get("x-client-address"), host: incoming.get("x-forwarded-host") })
	})
	app.use(lastResort)
	server = app.listen(0, "127.0.0.1")
	await once(server, "listening")
	origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
}

beforeEach(() => {
	reached = 0
})
afterEach(() => {
	server.closeAllConnections()
	server.close()
})

it("every answer carries the security headers once, and leaves the content policy to the page", async () => {
	await serve()
	const { headers } = await fetch(origin)
	expect(headers.get("x-content-type-options")).toBe("nosniff")
	expect(headers.get("x-frame-options")).toBe("DENY")
	expect(headers.get("permissions-policy")).toContain("camera=()")
	expect(headers.get("content-security-policy")).toBeNull()
	expect(headers.get("strict-transport-security")).toBeNull()
	// With "no-referrer" a browser hides the origin of the very forms that are checked for it.
	expect(headers.get("referrer-policy")).toBe("same-origin")
})

it("https is promised for the future only where the public address is https", async () => {
	await serve({ https: true })
	expect((await fetch(origin)).headers.get("strict-transport-security")).toMatch(/max-age=\d{8}/)
})

it("a body over the limit gets a plain page and reaches nothing", async () => {
	await serve()
	const response = await fetch(origin, { method: "POST", body: "a".repeat(1024 * 1024 + 1) })
	expect(response.status).toBe(413)
	expect(response.headers.get("content-type")).toContain("text/html")
	expect(await response.text()).toContain("too large")
	expect(reached).toBe(0)
	expect((await fetch(origin, { method: "POST", body: "a".repeat(1024 * 1024) })).status).toBe(200)
})

it("a check of a super may bring a photo of 10 MB, and no more", async () => {
	await serve()
	const megabyte = 1024 * 1024
	for (const path of ["crop/checks", "crop/checks.data", "crop/yards/a", "crop/supers/a"]) {
		const send = (bytes: number) =>
			fetch(`${origin}/desk/larkmoor/${path}`, { method: "POST", body: "a".repeat(bytes) })
		expect([path, (await send(11 * megabyte)).status]).toEqual([path, 200])
		expect([path, (await send(11 * megabyte + 1)).status]).toEqual([path, 413])
	}
	const elsewhere = await fetch(`${origin}/desk/larkmoor/crop`, { method: "POST", body: "a".repeat(megabyte + 1) })
	expect(elsewhere.status).toBe(413)
})

it("a body whose length is not told is refused, since it could grow without end", async () => {
	await serve()
	const outgoing = request(origin, { method: "POST", headers: { "transfer-encoding": "chunked" } })
	outgoing.end("a=b")
	const [response] = await once(outgoing, "response")
	response.resume()
	expect(response.statusCode).toBe(411)
	expect(reached).toBe(0)
})

it("only the proxies that are counted are believed about the client's address, and none about the host", async () => {
	const claimed = {
		"x-client-address": "192.0.2.1",
		"x-forwarded-for": "192.0.2.2, 192.0.2.3",
		"x-forwarded-host": "evil.example.test",
	}
	await serve()
	expect(await (await fetch(origin, { headers: claimed })).json()).toEqual({ address: "127.0.0.1" })
	server.close()
	await serve({ hops: 1 })
	expect(await (await fetch(origin, { headers: claimed })).json()).toEqual({ address: "192.0.2.3" })
})

it("an error outside the pages tells nothing of its cause", async () => {
	await serve()
	const logged = vi.spyOn(log, "error").mockReturnValue(undefined)
	const response = await fetch(`${origin}/broken`)
	expect(logged).toHaveBeenCalledOnce()
	logged.mockRestore()
	expect(response.status).toBe(500)
	expect(await response.text()).not.toContain("swordfish")
})
