import { createHash } from "node:crypto"
import { promisify } from "node:util"
import { brotliCompress, constants } from "node:zlib"
import type { RequestHandler } from "express"

/** A rendered page, ready to send: the same bytes until what it shows changes. */
type Copy = { stamp: string; etag: string; policy: string; html: Buffer; brotli: Buffer }

const compress = promisify(brotliCompress)

/** More pages than this are not kept; the one that was asked for longest ago goes first. */
const MOST_COPIES = 200

/**
 * Serves public pages from rendered copies with a strong ETag, never stale: before each answer `stampOf` is asked what
 * the page's content goes by now (null: not such a page), and only a copy of that very stamp is sent. The stamp is read
 * before the page is rendered, so a copy can be newer than its stamp but never older. Anything that goes wrong here
 * leaves the request to the pages themselves.
 */
export function renderedCopies(options: {
	/** The page's key, or null where the request is not for a page that is copied. */
	keyOf: (request: Parameters<RequestHandler>[0]) => string | null
	stampOf: (key: string) => Promise<string | null>
	render: (request: Request) => Promise<Response>
	origin: string
}): RequestHandler {
	const copies = new Map<string, Copy>()
	const making = new Map<string, Promise<Copy | null>>()
	const stampOf = sharedReading(options.stampOf)

	async function copyOf(key: string): Promise<Copy | null> {
		const stamp = await stampOf(key)
		if (stamp === null) return null
		const kept = copies.get(key)
		if (kept?.stamp === stamp) {
			keep(key, kept)
			return kept
		}
		const name = `${key} ${stamp}`
		let made = making.get(name)
		if (!made) {
			made = makeCopy(key, stamp).finally(() => making.delete(name))
			making.set(name, made)
		}
		return made
	}

	async function makeCopy(key: string, stamp: string): Promise<Copy | null> {
		const response = await options.render(new Request(new URL(key, options.origin)))
		const policy = response.headers.get("content-security-policy")
		if (response.status !== 200 || policy === null || response.headers.has("set-cookie")) return null
		const page = withoutNonce(await response.text(), policy)
		const html = Buffer.from(page.html)
		const copy: Copy = {
			stamp,
			etag: createHash("sha256").update(html).digest("base64url"),
			policy: page.policy,
			html,
			brotli: await compress(html, { params: { [constants.BROTLI_PARAM_QUALITY]: 5 } }),
		}
		keep(key, copy)
		return copy
	}

	/** Puts the copy last in line: a map is in the order of its entries' making. */
	function keep(key: string, copy: Copy): void {
		copies.delete(key)
		copies.set(key, copy)
		for (const oldest of copies.keys()) {
			if (copies.size <= MOST_COPIES) break
			copies.delete(oldest)
		}
	}

	return async (request, response, next) => {
		const key = options.keyOf(request)
		if (key === null || (request.method !== "GET" && request.method !== "HEAD")) return next()
		const copy = await copyOf(key).catch(() => null)
		if (!copy) return next()
		const takesBrotli = request.acceptsEncodings("br") === "br"
		// A strong tag names exact bytes, so each encoding has its own.
		const etag = `"${copy.etag}${takesBrotli ? "-br" : ""}"`
		response.set({
			"Cache-Control": "no-cache",
			"Content-Security-Policy": copy.policy,
			ETag: etag,
			Vary: "Accept-Encoding",
		})
		if (namesTag(request.headers["if-none-match"], etag)) return void response.status(304).end()
		const body = takesBrotli ? copy.brotli : copy.html
		if (takesBrotli) response.set("Content-Encoding", "br")
		response.set({ "Content-Type": "text/html; charset=utf-8", "Content-Length": String(body.length) })
		response.end(request.method === "HEAD" ? undefined : body)
	}
}

/**
 * Lets requests of one moment share a reading without ever using one that began before the request came: while a
 * reading is under way, all who come wait together for the next.
 */
export function sharedReading<Value>(read: (key: string) => Promise<Value>): (key: string) => Promise<Value> {
	const running = new Map<string, Promise<unknown>>()
	const next = new Map<string, Promise<Value>>()

	function start(key: string): Promise<Value> {
		const reading = read(key)
		const ended = reading.then(
			() => {},
			() => {},
		)
		running.set(key, ended)
		ended.then(() => running.get(key) === ended && running.delete(key))
		return reading
	}

	return (key) => {
		const under = running.get(key)
		if (!under) return start(key)
		let waiting = next.get(key)
		if (!waiting) {
			waiting = under.then(() => {
				next.delete(key)
				return start(key)
			})
			next.set(key, waiting)
		}
		return waiting
	}
}

/**
 * A nonce is good for one answer; in a copy, inline scripts are named by the hash of what they hold instead.
 * Source: Content Security Policy Level 3, 'sha256-…' sources.
 */
function withoutNonce(html: string, policy: string): { html: string; policy: string } {
	const nonce = /'nonce-([^']+)'/.exec(policy)?.[1]
	if (!nonce) return { html, policy }
	const bare = html.replaceAll(` nonce="${nonce}"`, "")
	const hashes = [...bare.matchAll(/<script(?![^>]*\ssrc=)[^>]*>([\s\S]*?)<\/script>/g)].map(
		([, content = ""]) => `'sha256-${createHash("sha256").update(content).digest("base64")}'`,
	)
	return { html: bare, policy: policy.replace(`'nonce-${nonce}'`, [...new Set(hashes)].join(" ")) }
}

function namesTag(header: string | undefined, etag: string): boolean {
	if (!header) return false
	return header.trim() === "*" || header.split(",").some((tag) => tag.trim().replace(/^W\//, "") === etag)
}
