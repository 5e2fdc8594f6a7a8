import autocannon from "autocannon"

/** Requests under way at once, from as many connections. */
export const CONNECTIONS = 8

/**
 * Sends requests to one address for `seconds`, or until `amount` have been answered, and answers `{ perSecond, medianMs,
 * p99Ms, count }`. Throws when an answer has another status than `status` or none comes: figures of a server that
 * refuses would mean nothing. `next` makes the options of each request anew (a body of its own, say).
 */
export async function load(url, { seconds, amount, headers = {}, method = "GET", status = 200, next }) {
	const times = []
	const statuses = new Map()
	const began = performance.now()
	let ended = began
	const instance = autocannon({
		url,
		method,
		connections: CONNECTIONS,
		...(amount ? { amount } : { duration: seconds }),
		timeout: 30,
		headers,
		...(next && { requests: [{ setupRequest: (request) => ({ ...request, ...next() }) }] }),
	})
	instance.on("response", (_client, code, _bytes, milliseconds) => {
		times.push(milliseconds)
		statuses.set(code, (statuses.get(code) ?? 0) + 1)
		ended = performance.now()
	})
	const result = await instance
	if (statuses.size !== 1 || !statuses.has(status) || result.errors > 0) {
		const found = [...statuses].map(([code, count]) => `${count} × ${code}`).join(", ")
		throw new Error(`${url} was to answer ${status}, but answered ${found || "nothing"}; ${result.errors} errors.`)
	}
	return { ...figuresOf(times), perSecond: (times.length * 1000) / (ended - began) }
}

/** Median and 99th percentile of single times in milliseconds. */
export function figuresOf(times) {
	const sorted = times.toSorted((a, b) => a - b)
	const at = (share) => sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)]
	return { medianMs: at(0.5), p99Ms: at(0.99), count: times.length }
}
