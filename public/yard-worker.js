// Keeps the pages of a producer's yards on the device, so that a round can be walked without signal. It is registered by
// those pages alone and sees only them and what they load. Pages come from the network when there is one, else as they were
// last seen; parts under /assets change their name with their content, so the kept copy is as good as a new one.

const PAGES = "waxbill-yard-pages-1"
const PARTS = "waxbill-yard-parts-1"
const MOST_PAGES = 40
const MOST_PARTS = 300
const PATIENCE_MS = 5000

self.addEventListener("install", () => self.skipWaiting())
self.addEventListener("activate", (event) => event.waitUntil(self.clients.claim()))

self.addEventListener("message", (event) => {
	if (event.data?.kind === "keep-page") event.waitUntil(keepPage(event.data.page, event.data.parts))
})

self.addEventListener("fetch", (event) => {
	const { request } = event
	const { origin, pathname } = new URL(request.url)
	if (request.method !== "GET" || origin !== self.location.origin) return
	if (request.mode === "navigate") event.respondWith(openPage(request))
	else if (isPart(pathname)) event.respondWith(openPart(request))
})

const isPart = (pathname) => pathname.startsWith("/assets/") || /^\/[\w-]+\.(svg|ico)$/.test(pathname)

/** A page by its address, without what it says only once. */
function keyOf(url) {
	const address = new URL(url)
	address.searchParams.delete("checked")
	address.hash = ""
	return address.href
}

async function openPage(request) {
	const kept = await (await caches.open(PAGES)).match(keyOf(request.url))
	try {
		const answer = await (kept ? within(PATIENCE_MS, fetchWhole(request)) : fetchWhole(request))
		// A redirect leads to the sign-in page: the session is over, and so is what it may see.
		if (answer.type === "opaqueredirect") await caches.delete(PAGES)
		else if (answer.status === 403 || answer.status === 404) await forget(request.url)
		else if (answer.ok) await store(request.url, answer.clone())
		return answer
	} catch (error) {
		if (kept) return kept
		throw error
	}
}

async function openPart(request) {
	const cache = await caches.open(PARTS)
	const kept = await cache.match(request.url)
	if (kept) return kept
	const answer = await fetch(request)
	if (answer.ok) await cache.put(request.url, answer.clone())
	return answer
}

/** The first visit of a page came before this worker did: it is asked for again, with all that it had loaded. */
async function keepPage(page, parts) {
	const answer = await fetchWhole(new Request(page, { redirect: "manual", cache: "no-store" }))
	if (!answer.ok || !answer.headers.get("content-type")?.startsWith("text/html")) return
	await store(page, answer)
	const cache = await caches.open(PARTS)
	for (const part of parts) {
		if (await cache.match(part)) continue
		const got = await fetch(part).catch(() => null)
		if (got?.ok) await cache.put(part, got)
	}
	await trim(cache, MOST_PARTS)
}

/** A page to its last byte: one that breaks off on the way is as good as none, and must not take the kept one's place. */
async function fetchWhole(request) {
	const answer = await fetch(request)
	if (answer.type === "opaqueredirect") return answer
	const { status, statusText, headers } = answer
	return new Response(await answer.blob(), { status, statusText, headers })
}

async function store(url, answer) {
	const cache = await caches.open(PAGES)
	await cache.put(keyOf(url), answer)
	await trim(cache, MOST_PAGES)
}

async function forget(url) {
	const cache = await caches.open(PAGES)
	await cache.delete(keyOf(url))
}

async function trim(cache, most) {
	const keys = await cache.keys()
	for (const key of keys.slice(0, Math.max(0, keys.length - most))) await cache.delete(key)
}

function within(milliseconds, promise) {
	return new Promise((resolve, reject) => {
		setTimeout(() => reject(new Error("too slow")), milliseconds)
		promise.then(resolve, reject)
	})
}
