import { createHash } from "node:crypto"
import { StripeRefusal } from "./errors"
import type { KeptAnswer, Store } from "./store"

const KEPT_MS = 24 * 60 * 60 * 1000

/** What a key is bound to: the path and the body, so that another question under the same key is noticed. */
export function fingerprintOf(path: string, body: string): string {
	return createHash("sha256").update(`${path}\n${body}`).digest("hex")
}

/** Remembers answers by idempotency key for a day, as Stripe does. */
export function createIdempotency(store: Store, clock: () => number) {
	const underWay = new Set<string>()
	return {
		/**
		 * Claims `key` for a new call, or returns the answer that an earlier call got. Refuses another body or path
		 * under a known key (400), and a key whose first call is still under way (409). Claims end with `release`.
		 */
		claim(key: string, fingerprint: string): KeptAnswer | undefined {
			const kept = store.answers.get(key)
			if (kept && clock() - kept.at < KEPT_MS) {
				if (kept.fingerprint === fingerprint) return kept
				throw new StripeRefusal(400, {
					type: "idempotency_error",
					message: `Keys for idempotent requests can only be used with the same parameters they were first used with. Try using a key other than '${key}' if you meant to execute a different request.`,
				})
			}
			if (underWay.has(key)) {
				throw new StripeRefusal(409, {
					type: "idempotency_error",
					code: "idempotency_key_in_use",
					message: `There is currently another in-progress request using this Idempotent Key (that probably means you submitted twice, and the other request is still going through): ${key}.`,
				})
			}
			underWay.add(key)
			return undefined
		},
		/** Keeps the answer of a call that took effect; calls refused before that are not kept and may be mended. */
		keep(key: string, answer: KeptAnswer): void {
			store.answers.set(key, answer)
			for (const [old, { at }] of store.answers) {
				if (clock() - at < KEPT_MS) break
				store.answers.delete(old)
			}
		},
		release(key: string): void {
			underWay.delete(key)
		},
	}
}
