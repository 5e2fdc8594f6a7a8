import { drizzle, type NodePgDatabase } from "drizzle-orm/node-postgres"
import type { PoolClient } from "pg"
import { pool } from "./client.server"
import { isWorthRepeating } from "./errors.server"
import { preparing } from "./prepared.server"

declare const inTransaction: unique symbol

/** A handle that is inside a transaction; only the helpers below make one, so the compiler refuses anything else. */
export type Tx = NodePgDatabase & { readonly [inTransaction]: "producer" }

/** A handle on the tables that belong to no producer: people, sessions, codes, events as they come in. */
export type PlatformTx = NodePgDatabase & { readonly [inTransaction]: "platform" }

const uuid = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/

/**
 * Runs `work` in one transaction that sees and writes the rows of this producer and no other (row security).
 * `work` may run again after a deadlock, so it must have no effect outside the database. Throws what `work` throws,
 * after rolling back.
 */
export function withProducer<T>(producerId: string, work: (tx: Tx) => Promise<T>): Promise<T> {
	return repeated(() => inOneTransaction(`begin; ${setting("waxbill.producer_id", producerId)}`, work))
}

/** As `withProducer`, for reading: the database refuses any write, and all statements see one moment. */
export function readProducer<T>(producerId: string, work: (tx: Tx) => Promise<T>): Promise<T> {
	return inOneTransaction(
		`begin isolation level repeatable read read only; ${setting("waxbill.producer_id", producerId)}`,
		work,
	)
}

/** One transaction on the tables that belong to no producer. Rows of producers are invisible in it. */
export function withPlatform<T>(work: (tx: PlatformTx) => Promise<T>): Promise<T> {
	return repeated(() => inOneTransaction("begin", work))
}

/** Reads what a person may know of themselves across producers: their own memberships. */
export function readPerson<T>(userId: string, work: (tx: Tx) => Promise<T>): Promise<T> {
	return inOneTransaction(
		`begin isolation level repeatable read read only; ${setting("waxbill.user_id", userId)}`,
		work,
	)
}

// `begin` and the setting go in one round trip, which takes no parameters: hence the strict check of the id.
function setting(name: string, id: string): string {
	if (!uuid.test(id)) throw new TypeError(`not an id: ${name}`)
	return `set local ${name} = '${id}'`
}

async function repeated<T>(run: () => Promise<T>): Promise<T> {
	for (let tries = 1; ; tries++) {
		try {
			return await run()
		} catch (error) {
			if (tries === 3 || !isWorthRepeating(error)) throw error
		}
	}
}

async function inOneTransaction<T, H>(begin: string, work: (tx: H) => Promise<T>): Promise<T> {
	const client: PoolClient = await pool().connect()
	let broken: Error | undefined
	try {
		await client.query(begin)
		const result = await work(drizzle({ client: preparing(client) }) as H)
		await client.query("commit")
		return result
	} catch (error) {
		await client.query("rollback").catch((failure: Error) => {
			broken = failure
		})
		throw error
	} finally {
		// A connection that could not even roll back is thrown away, not given to the next request.
		client.release(broken)
	}
}
