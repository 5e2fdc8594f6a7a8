import { createHash } from "node:crypto"
import { createServer, request as httpRequest } from "node:http"
import type { AddressInfo } from "node:net"
import { brotliDecompressSync } from "node:zlib"
import express from "express"
import { afterEach, describe, expect, test } from "vitest"
import { renderedCopies, sharedReading } from "~/platform/rendered-copy.server"

/** A reading whose answers come when the test says so. */
function heldReading() {
	const begun: { key: string; answer: (value: string) => void; fail: (error: Error) => void }[] = []
	const read = (key: string) =>
		new Promise<string>((answer, fail) => {
			begun.push({ key, answer, fail })
		})
	return { begun, read: sharedReading(read) }
}

/** Lets everything that waits on settled promises run. */
const settle = () => new Promise<void>((resolve) => setImmediate(resolve))

describe("a shared reading", () => {
	test("is never one that began before the request came", async () => {
		const { begun, read } = heldReading()
		const first = read("shop")
		const second = read("shop")
		const third = read("shop")
		expect(begun).toHaveLength(1)
		begun[0]?.answer("before the sale")
		expect(await first).toBe("before the sale")
		await settle()
		// Those who came while the first was under way wait together for one reading of their own.
		expect(begun).toHaveLength(2)
		const fourth = read("shop")
		begun[1]?.answer("after the sale")
		expect(await Promise.all([second, third])).toEqual(["after the sale", "after the sale"])
		await settle()
		expect(begun).toHaveLength(3)
		begun[2]?.answer("later still")
		expect(await fourth).toBe("later still")
	})

	test("begins at once when none is under way, and keeps shops apart", async () => {
		const { begun, read } = heldReading()
		const [one, other] = [read("one"), read("other")]
		expect(begun.map(({ key }) => key)).toEqual(["one", "other"])
		begun[1]?.answer("b")
		begun[0]?.answer("a")
		expect(await Promise.all([one, other])).toEqual(["a", "b"])
		await settle()
		void read("one")
		expect(begun).toHaveLength(3)
	})

	test("that fails is no answer for those who wait for the next", async () => {
		const { begun, read } = heldReading()
		const first = read("shop")
		const second = read("shop")
		begun[0]?.fail(new Error("database away"))
		await expect(first).rejects.toThrow("database away")
		await settle()
		begun[1]?.answer("back again")
		expect(await second).toBe("back again")
	})
})

const closers: (() => void)[] = []
afterEach(() => {
	for (const close of closers.splice(0)) close()
})

type Answer = { status: number; headers: Record<string, string | string[] | undefined>; body: Buffer }
type Asked = { method?: string; headers?: Record<string, string> }

/** A server whose pages say what `content` is at the moment they are rendered, each answer with a nonce of its own. */
async function startShop(shop: {
	stamp: (key: string) => Promise<string | null>
	content: (key: string) => Promise<string>
	answerHeaders?: Record<string, string>
	status?: number
}) {
	let renders = 0
	const app = express()
	app.disable("etag")
	app.use(
		renderedCopies({
			keyOf: (request) => (request.path.startsWith("/shop/") ? request.url : null),
			stampOf: shop.stamp,
			render: async (request) => {
				renders += 1
				const nonce = `n${renders}`
				const words = await shop.content(new URL(request.url).pathname)
				const html = `<script nonce="${nonce}">go()</script><script nonce="${nonce}" src="/a.js"></script><p>${words}</p>`
				const policy = `default-src 'self'; script-src 'self' 'nonce-${nonce}'`
				const headers = { "Content-Security-Policy": policy, ...shop.answerHeaders }
				return new Response(html, { status: shop.status ?? 200, headers })
			},
			origin: "http://shop.example.test",
		}),
	)
	app.use((_request, response) => {
		response.status(418).end("by the page itself")
	})
	const server = createServer(app)
	await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve))
	closers.push(() => {
		server.closeAllConnections()
		server.close()
	})
	const { port } = server.address() as AddressInfo
	const get = (path: string, { method = "GET", headers = {} }: Asked = {}) =>
		new Promise<Answer>((resolve, reject) => {
			const sent = httpRequest({ host: "127.0.0.1", port, path, method, headers }, async (response) => {
				const parts: Buffer[] = []
				for await (const part of response) parts.push(part)
				resolve({ status: response.statusCode ?? 0, headers: response.headers, body: Buffer.concat(parts) })
			})
			sent.on("error", reject).end()
		})
	return { get, renders: () => renders }
}

describe("a rendered copy", () => {
	test("is rendered once and sent again byte for byte until what it goes by changes", async () => {
		let sold = 0
		const { get, renders } = await startShop({
			stamp: async () => `v${sold}`,
			content: async () => `${9 - sold} left`,
		})
		const [first, second] = [await get("/shop/larkmoor"), await get("/shop/larkmoor")]
		expect(renders()).toBe(1)
		expect(second.body).toEqual(first.body)
		expect(second.headers.etag).toBe(first.headers.etag)
		expect(first.headers["cache-control"]).toBe("no-cache")
		expect(first.headers["content-length"]).toBe(String(first.body.length))
		sold = 1
		const third = await get("/shop/larkmoor")
		expect(third.body.toString()).toContain("8 left")
		expect(third.headers.etag).not.toBe(first.headers.etag)
		expect(renders()).toBe(2)
	})

	test("carries no nonce: its one inline script is named by the hash of what it holds", async () => {
		const { get } = await startShop({ stamp: async () => "v1", content: async () => "9 left" })
		const { headers, body } = await get("/shop/larkmoor")
		expect(body.toString()).toBe('<script>go()</script><script src="/a.js"></script><p>9 left</p>')
		const hash = createHash("sha256").update("go()").digest("base64")
		expect(headers["content-security-policy"]).toBe(`default-src 'self'; script-src 'self' 'sha256-${hash}'`)
	})

	test("changed while it is rendered may be newer than its stamp, but is not taken for the new one", async () => {
		let version = 1
		let release = () => {}
		const held = new Promise<void>((resolve) => {
			release = resolve
		})
		const { get, renders } = await startShop({
			stamp: async () => `v${version}`,
			content: async () => {
				if (version === 1) await held
				return `version ${version}`
			},
		})
		const slow = get("/shop/larkmoor")
		await expect.poll(renders).toBe(1)
		version = 2
		const quick = await get("/shop/larkmoor")
		release()
		expect((await slow).body.toString()).toContain("version 2")
		expect(quick.body.toString()).toContain("version 2")
		// The slow one came last and is kept under the old stamp: it must not be sent as the new one.
		expect((await get("/shop/larkmoor")).body.toString()).toContain("version 2")
		version = 3
		expect((await get("/shop/larkmoor")).body.toString()).toContain("version 3")
	})

	test("is answered with 304 and nothing else to who has it, under the tag of its encoding", async () => {
		const { get } = await startShop({ stamp: async () => "v1", content: async () => "9 left" })
		const plain = await get("/shop/larkmoor")
		const brotli = await get("/shop/larkmoor", { headers: { "accept-encoding": "gzip, br" } })
		expect(brotli.headers["content-encoding"]).toBe("br")
		expect(brotliDecompressSync(brotli.body)).toEqual(plain.body)
		expect(brotli.headers.etag).not.toBe(plain.headers.etag)
		expect(plain.headers.vary).toBe("Accept-Encoding")
		const tag = String(plain.headers.etag)
		expect(tag).toMatch(/^"[^"]+"$/)
		for (const known of [tag, `W/${tag}`, `"other", ${tag}`, "*"]) {
			const again = await get("/shop/larkmoor", { headers: { "if-none-match": known } })
			expect(again).toMatchObject({ status: 304, headers: { etag: tag } })
			expect(again.body).toHaveLength(0)
		}
		const other = await get("/shop/larkmoor", { headers: { "if-none-match": String(brotli.headers.etag) } })
		expect(other.status).toBe(200)
	})

	test("answers HEAD with the head alone, and leaves a post to the pages", async () => {
		const { get, renders } = await startShop({ stamp: async () => "v1", content: async () => "9 left" })
		const head = await get("/shop/larkmoor", { method: "HEAD" })
		const whole = await get("/shop/larkmoor")
		expect(head).toMatchObject({ status: 200, headers: { etag: whole.headers.etag } })
		expect(head.headers["content-length"]).toBe(String(whole.body.length))
		expect(head.body).toHaveLength(0)
		expect(renders()).toBe(1)
		expect((await get("/shop/larkmoor", { method: "POST" })).status).toBe(418)
	})

	test.each([
		["an unknown yard", { stamp: async () => null }],
		["a database that is away", { stamp: () => Promise.reject(new Error("away")) }],
		["a page that sets a cookie", { answerHeaders: { "Set-Cookie": "a=b" } }],
		["a page that is not found", { status: 404 }],
		["a page that cannot be rendered", { content: () => Promise.reject(new Error("broken")) }],
	])("is not made of %s: the pages answer", async (_what, shop) => {
		const { get } = await startShop({ stamp: async () => "v1", content: async () => "9 left", ...shop })
		expect(await get("/shop/larkmoor")).toMatchObject({ status: 418, body: Buffer.from("by the page itself") })
		expect((await get("/elsewhere")).status).toBe(418)
	})

	test("is rendered once for many who come together", async () => {
		const { get, renders } = await startShop({ stamp: async () => "v1", content: async () => "9 left" })
		const answers = await Promise.all(Array.from({ length: 30 }, () => get("/shop/larkmoor")))
		expect(new Set(answers.map(({ headers }) => headers.etag)).size).toBe(1)
		expect(renders()).toBe(1)
	})

	test("is one of two hundred at most: the one asked for longest ago goes first", async () => {
		const { get, renders } = await startShop({ stamp: async () => "v1", content: async (key) => key })
		for (let n = 0; n < 200; n += 1) await get(`/shop/yard-${n}`)
		await get("/shop/yard-0")
		expect(renders()).toBe(200)
		await get("/shop/yard-200")
		await get("/shop/yard-0")
		expect(renders()).toBe(201)
		await get("/shop/yard-1")
		expect(renders()).toBe(202)
	})
})
