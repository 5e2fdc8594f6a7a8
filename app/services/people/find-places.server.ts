import { and, asc, eq, inArray, isNull } from "drizzle-orm"
import { memberships, producers, stores } from "~/db/schema"
import { readPerson, readProducer } from "~/db/transaction.server"

/** Where a person is at home: the address of the page, what it is called, and the zone that its times are told in. */
export type Place = { href: string; name: string; timeZone: string }

const DESK_ROLES: readonly string[] = ["owner", "desk", "packer"]

/** Every desk, stall and store where the person has a role, by name; desks first, then stalls, then stores. */
export async function findPlaces(userId: string): Promise<Place[]> {
	const held = await readPerson(userId, (tx) =>
		tx
			.select({
				producerId: producers.id,
				slug: producers.slug,
				name: producers.name,
				timeZone: producers.timeZone,
				role: memberships.role,
				storeId: memberships.storeId,
			})
			.from(memberships)
			.innerJoin(producers, eq(producers.id, memberships.producerId))
			.where(and(eq(memberships.userId, userId), isNull(memberships.endedAt)))
			.orderBy(asc(producers.name), asc(producers.id)),
	)
	const desks = held
		.filter(({ role }) => DESK_ROLES.includes(role))
		.map(({ slug, name, timeZone }) => ({ href: `/desk/${slug}`, name: `${name}, the desk`, timeZone }))
	const stalls = held
		.filter(({ role }) => role === "stall")
		.map(({ slug, name, timeZone }) => ({ href: `/stall/${slug}`, name: `${name}, the stall`, timeZone }))
	return onceEach([...desks, ...stalls, ...(await storesOf(held))])
}

type Held = { producerId: string; slug: string; name: string; timeZone: string; storeId: string | null }

/** Stores belong to their producer, so each producer's are read on its own. */
async function storesOf(held: Held[]): Promise<Place[]> {
	const places: Place[] = []
	for (const producerId of new Set(held.filter(({ storeId }) => storeId).map((one) => one.producerId))) {
		const ofProducer = held.filter((one) => one.producerId === producerId)
		const ids = ofProducer.flatMap(({ storeId }) => storeId ?? [])
		const [{ slug, name, timeZone } = { slug: "", name: "", timeZone: "UTC" }] = ofProducer
		const found = await readProducer(producerId, (tx) =>
			tx
				.select({ slug: stores.slug, name: stores.name })
				.from(stores)
				.where(and(eq(stores.producerId, producerId), inArray(stores.id, ids)))
				.orderBy(asc(stores.name), asc(stores.id)),
		)
		for (const store of found)
			places.push({ href: `/buy/${slug}/${store.slug}`, name: `${store.name}, from ${name}`, timeZone })
	}
	return places
}

function onceEach(places: Place[]): Place[] {
	return [...new Map(places.map((place) => [place.href, place])).values()]
}
