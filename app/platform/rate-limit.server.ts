import type { Pool } from "pg"
import { RateLimiterPostgres, RateLimiterRes } from "rate-limiter-flexible"
import { pool } from "~/db/client.server"
import type { Result } from "~/domain/result"
import { hmac } from "./secrets.server"

/** At most `points` takes for one key within `seconds` from the first. `name` tells limits apart in the table. */
export type Limit = { name: string; points: number; seconds: number }

export type Taken = Result<object, { ok: false; reason: "too-many"; retryAfterSeconds: number }>

/**
 * Takes one from each limit for its key, in order; the first that is used up refuses and the rest are left alone. Counters
 * are shared by all processes through the table `rate_limits`, by a hash of the key. When the database cannot be asked
 * it throws, so that nothing passes uncounted.
 */
export async function takeFrom(...takes: [limit: Limit, key: string][]): Promise<Taken> {
	for (const [limit, key] of takes) {
		try {
			await limiterFor(limit).consume(hmac("rate-limit", limit.name, key))
		} catch (refusal) {
			if (!(refusal instanceof RateLimiterRes)) throw refusal
			return { ok: false, reason: "too-many", retryAfterSeconds: Math.max(Math.ceil(refusal.msBeforeNext / 1000), 1) }
		}
	}
	return { ok: true }
}

// One for each limit and pool, since each keeps a timer that clears away what has expired.
const limiters = new WeakMap<Pool, Map<string, RateLimiterPostgres>>()

function limiterFor(limit: Limit): RateLimiterPostgres {
	const client = pool()
	const known = limiters.get(client) ?? new Map<string, RateLimiterPostgres>()
	limiters.set(client, known)
	const limiter =
		known.get(limit.name) ??
		new RateLimiterPostgres({
			storeClient: client,
			storeType: "pool",
			tableName: "rate_limits",
			tableCreated: true,
			keyPrefix: limit.name,
			points: limit.points,
			duration: limit.seconds,
		})
	known.set(limit.name, limiter)
	return limiter
}
