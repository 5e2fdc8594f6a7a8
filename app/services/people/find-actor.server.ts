import { identify } from "~/db/identify.server"
import type { ProducerRole, StoreRole } from "~/domain/people/roles"

export type Person = { id: string; name: string; email: string; sessionId: string; lastSeenAt: Date }
export type Producer = { id: string; slug: string; name: string; county: string; timeZone: string }
export type Store = { id: string; slug: string; name: string }

/** Who asks, and what they are at the producer and the store that the address names. */
export type Actor = {
	person: Person | null
	producer: Producer | null
	/** Roles at the producer itself; those at the named store are in `storeRoles`. */
	roles: ProducerRole[]
	/** Whether the person buys for any store of this producer. */
	isBuyer: boolean
	store: Store | null
	storeRoles: StoreRole[]
}

const isStoreRole = (role: string): role is StoreRole => role === "buyer" || role === "payer"

/**
 * Finds the person behind a session token (by its hash) and their roles at the named producer and store, in one round
 * trip. A store is found only for those who buy for it. Unknown names give nulls, never an error.
 */
export async function findActor(query: {
	tokenHash: string | null
	producerSlug: string | null
	storeSlug: string | null
}): Promise<Actor> {
	const found = await identify(query.tokenHash, query.producerSlug, query.storeSlug)
	const { producerSlug, storeSlug } = query
	return {
		person: found.session_id
			? {
					id: found.user_id,
					name: found.user_name,
					email: found.user_email,
					sessionId: found.session_id,
					lastSeenAt: found.last_seen_at,
				}
			: null,
		producer:
			found.producer_id && producerSlug
				? {
						id: found.producer_id,
						slug: producerSlug,
						name: found.producer_name,
						county: found.county,
						timeZone: found.time_zone,
					}
				: null,
		roles: found.roles.filter((role) => !isStoreRole(role)) as ProducerRole[],
		isBuyer: found.roles.some(isStoreRole),
		store: found.store_id && storeSlug ? { id: found.store_id, slug: storeSlug, name: found.store_name } : null,
		storeRoles: found.store_roles.filter(isStoreRole),
	}
}
