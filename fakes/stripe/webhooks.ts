import Stripe from "stripe"
import type { Store } from "./store"
import type { Switches } from "./switches"

export type Endpoint = { url: string; secret: string }
export type RetryPause = { firstMs: number; longestMs: number; tries: number }

/** Sends events to the application's endpoint. */
export type Courier = {
	/** Queues an event, or keeps it back while events are held. */
	deliver: (event: Stripe.Event) => void
	/** Sends what was held back, oldest first or in reverse, and resolves when each has had its first try. */
	flush: (order: "created" | "reverse") => Promise<void>
	/** Resolves when no first try is under way or waiting. */
	idle: () => Promise<void>
	/** Forgets what is held and all retries to come. */
	drop: () => void
	/** Drops everything and breaks off what is under way. */
	stop: () => void
}

/** The milliseconds to wait after the nth try (from 1) before the next: `firstMs`, then doubling up to `longestMs`. */
export function pauseAfter(attempt: number, pause: RetryPause): number {
	return Math.min(pause.firstMs * 2 ** (attempt - 1), pause.longestMs)
}

/**
 * A courier to `endpoint`. First tries go one after the other in the order of the events; a try that is not answered
 * 2xx within ten seconds is repeated after a pause that doubles each time, and holds up nobody else. An event counts as
 * delivered (`pending_webhooks` 0) once every copy of it was accepted. Without an endpoint events are only recorded.
 */
export function createCourier(
	store: Store,
	switches: Switches,
	endpoint: Endpoint | undefined,
	pause: RetryPause,
	saved: () => void,
): Courier {
	const held: Stripe.Event[] = []
	const timers = new Set<NodeJS.Timeout>()
	let line = Promise.resolve()
	let stopping = new AbortController()

	async function post(to: Endpoint, event: Stripe.Event): Promise<number | null> {
		const payload = JSON.stringify(event, null, 2)
		try {
			const response = await fetch(to.url, {
				method: "POST",
				redirect: "manual",
				headers: {
					"Content-Type": "application/json; charset=utf-8",
					"Stripe-Signature": Stripe.webhooks.generateTestHeaderString({ payload, secret: to.secret }),
					"User-Agent": "Stripe/1.0 (a fake for tests)",
				},
				body: payload,
				signal: AbortSignal.any([stopping.signal, AbortSignal.timeout(10_000)]),
			})
			await response.arrayBuffer()
			return response.status
		} catch {
			// Refused, reset, timed out or stopped: all the same to the courier, which tries again.
			return null
		}
	}

	async function tryOnce(to: Endpoint, event: Stripe.Event, attempt: number): Promise<void> {
		const epoch = stopping
		const status = await post(to, event)
		if (epoch.signal.aborted) return
		store.deliveries.push({ event: event.id, type: event.type, status, at: Date.now() })
		if (store.deliveries.length > 5000) store.deliveries.shift()
		if (status !== null && status >= 200 && status < 300) {
			event.pending_webhooks = Math.max(0, event.pending_webhooks - 1)
			saved()
			return
		}
		if (attempt >= pause.tries) return
		const timer = setTimeout(
			() => {
				timers.delete(timer)
				void tryOnce(to, event, attempt + 1)
			},
			pauseAfter(attempt, pause),
		)
		timers.add(timer)
	}

	function send(event: Stripe.Event): void {
		if (!endpoint) return
		const copies = 1 + switches.repeatEvents
		event.pending_webhooks = copies
		for (let copy = 0; copy < copies; copy += 1) {
			const epoch = stopping
			line = line.then(() => (epoch.signal.aborted ? undefined : tryOnce(endpoint, event, 1)))
		}
	}

	function drop(): void {
		stopping.abort()
		stopping = new AbortController()
		held.length = 0
		for (const timer of timers) clearTimeout(timer)
		timers.clear()
	}

	return {
		deliver(event) {
			if (switches.muteEvents) event.pending_webhooks = 0
			else if (switches.holdEvents) held.push(event)
			else send(event)
		},
		async flush(order) {
			const waiting = held.splice(0)
			for (const event of order === "reverse" ? waiting.reverse() : waiting) send(event)
			await line
		},
		async idle() {
			await line
		},
		drop,
		stop: drop,
	}
}
