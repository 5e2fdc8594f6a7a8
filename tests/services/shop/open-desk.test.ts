import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import { memberships, priceTiers, producerSettings, producers, users } from "~/db/schema"
import { readProducer, withPlatform } from "~/db/transaction.server"
import { findPlaces } from "~/services/people/find-places.server"
import { openDesk } from "~/services/producers/open-desk.server"
import { findShopFront } from "~/services/shop/find-shop-front.server"

async function addPerson(name: string) {
	const person = { id: randomUUID(), name, email: `${randomUUID()}@yard.example.test` }
	await withPlatform((tx) => tx.insert(users).values(person))
	return person
}

const deskOf = (person: Awaited<ReturnType<typeof addPerson>>, slug: string, name = "Fallow Hill Bees") =>
	openDesk({ person, name, slug, county: "Fallow County", timeZone: "America/Chicago" })

const idOf = async (slug: string) =>
	(await withPlatform((tx) => tx.select().from(producers))).find((producer) => producer.slug === slug)?.id ?? ""

test("a new desk has its owner, a price list and an empty shop, and nothing of anyone else's", async () => {
	const [hilde, orla] = [await addPerson("Hilde Marsh"), await addPerson("Orla Pike")]
	const slugs = [`fallow-${randomUUID().slice(0, 8)}`, `marsh-${randomUUID().slice(0, 8)}`] as const
	expect(await deskOf(hilde, slugs[0])).toEqual({ ok: true, slug: slugs[0] })
	expect(await deskOf(orla, slugs[1], "Marsh End Honey")).toEqual({ ok: true, slug: slugs[1] })
	expect((await findPlaces(hilde.id)).map(({ href }) => href)).toEqual([`/desk/${slugs[0]}`])

	const producerId = await idOf(slugs[0])
	const own = await readProducer(producerId, async (tx) => ({
		settings: await tx.select().from(producerSettings),
		tiers: await tx.select().from(priceTiers),
		members: await tx.select().from(memberships),
	}))
	expect(own.settings).toMatchObject([{ producerId, email: hilde.email, contactName: "Hilde Marsh" }])
	expect(own.tiers.map(({ name }) => name)).toEqual(["Stores"])
	expect(own.members).toMatchObject([{ producerId, userId: hilde.id, role: "owner" }])
	const front = await findShopFront({ producer: { id: producerId, timeZone: "America/Chicago" }, dayId: null })
	expect(front).toMatchObject({ days: [], items: [], chosen: null })
})

test("a name in addresses that another yard has is refused, and nothing is written", async () => {
	const [hilde, orla] = [await addPerson("Hilde Marsh"), await addPerson("Orla Pike")]
	const slug = `fallow-${randomUUID().slice(0, 8)}`
	await deskOf(hilde, slug)
	expect(await deskOf(orla, slug)).toEqual({ ok: false, reason: "slug-taken" })
	expect(await findPlaces(orla.id)).toEqual([])
	// Its own owner, for another yard, is refused as well.
	expect(await deskOf(hilde, slug, "Second Hill Bees")).toEqual({ ok: false, reason: "slug-taken" })
})

test("a desk that is opened twice in one moment is one desk", async () => {
	const hilde = await addPerson("Hilde Marsh")
	const slug = `fallow-${randomUUID().slice(0, 8)}`
	expect(await Promise.all([deskOf(hilde, slug), deskOf(hilde, slug)])).toEqual([
		{ ok: true, slug },
		{ ok: true, slug },
	])
	expect(await findPlaces(hilde.id)).toHaveLength(1)
})
