import { randomUUID } from "node:crypto"
import {
	deliveryRounds,
	lots,
	memberships,
	outboxMails,
	prices,
	priceTiers,
	producerSettings,
	producers,
	products,
	stockMoves,
	storeRounds,
	stores,
	users,
} from "~/db/schema"
import { withPlatform, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

/** Thursday, August 13, 2026, 2:15 pm in the yard's zone. Last orders for Tuesday 18 are Friday at noon. */
export const THURSDAY = new Date("2026-08-13T18:15:00Z")
export const TUESDAY_18 = "2026-08-18"
export const ZONE = "America/New_York"

export type Yard = { producerId: string; slug: string; tierId: string; roundIds: string[] }
export type Shop = { producerId: string; storeId: string; slug: string; person: { id: string; email: string } }

/** A producer with one price tier, a round on Tuesday (closes Friday noon) and one on Friday (closes Wednesday noon). */
export async function openYard(slug = `yard-${randomUUID().slice(0, 8)}`): Promise<Yard> {
	const producerId = randomUUID()
	const tierId = randomUUID()
	const roundIds = [randomUUID(), randomUUID()]
	await withProducer(producerId, async (tx) => {
		await tx.insert(producers).values({ id: producerId, slug, name: "Larkmoor Bee Yard", timeZone: ZONE })
		await tx.insert(producerSettings).values({
			producerId,
			address: "Weld Lane, Teasel County",
			email: "orders@larkmoor.example.test",
			contactName: "Ida",
		})
		await tx.insert(priceTiers).values({ producerId, id: tierId, name: "Shops" })
		await tx.insert(deliveryRounds).values([
			{ producerId, id: roundIds[0], name: "Town", weekday: 2, cutoffDaysBefore: 4, cutoffTime: "12:00" },
			{ producerId, id: roundIds[1], name: "Coast", weekday: 5, cutoffDaysBefore: 2, cutoffTime: "12:00" },
		])
	})
	return { producerId, slug, tierId, roundIds }
}

/** A store on both rounds with one buyer: minimum $600, delivery $18, free above the minimum. */
export async function openStore(yard: Yard, slug = `store-${randomUUID().slice(0, 8)}`): Promise<Shop> {
	const { producerId } = yard
	const storeId = randomUUID()
	const person = { id: randomUUID(), email: `rosa@${slug}.example.test` }
	await withPlatform((tx) => tx.insert(users).values({ ...person, name: "Rosa Quill" }))
	await withProducer(producerId, async (tx) => {
		await tx.insert(stores).values({
			producerId,
			id: storeId,
			slug,
			name: "Pantry & Plume",
			tierId: yard.tierId,
			address: "12 Carder Street",
			minimumCents: 60_000,
			deliveryChargeCents: 1_800,
			freeAboveCents: 60_000,
		})
		await tx.insert(storeRounds).values(yard.roundIds.map((roundId) => ({ producerId, storeId, roundId })))
		await tx.insert(memberships).values({ producerId, userId: person.id, role: "buyer", storeId })
	})
	return { producerId, storeId, slug, person }
}

/** A product in cases of 12 at $114.00, from three cases $108.30, with so many whole cases released and ready. */
export async function addProduct(
	yard: Yard,
	product: { code: string; readyCases: number; family?: string; validFrom?: Day },
): Promise<string> {
	const { producerId, tierId } = yard
	const productId = randomUUID()
	const lotId = randomUUID()
	const validFrom = product.validFrom ?? "2026-01-01"
	await withProducer(producerId, async (tx) => {
		await tx.insert(products).values({
			producerId,
			id: productId,
			code: product.code,
			name: `Round section ${product.code}`,
			form: "round",
			colour: "light",
			detail: "Fancy, 8 oz",
			pieceNetGrams: 226,
			piecesPerCase: 12,
			breakFamily: product.family ?? "sections",
		})
		await tx.insert(prices).values([
			{ producerId, tierId, productId, minCases: 1, caseCents: 11_400, validFrom },
			{ producerId, tierId, productId, minCases: 3, caseCents: 10_830, validFrom },
		])
		if (product.readyCases === 0) return
		const pieces = product.readyCases * 12
		await tx.insert(lots).values({
			producerId,
			id: lotId,
			code: `L-${product.code}`,
			productId,
			state: "released",
			harvestedOn: "2026-07-01",
			expectedReleaseOn: "2026-07-10",
			bestBeforeOn: "2027-07-01",
			piecesHarvested: pieces,
		})
		await tx.insert(stockMoves).values({ producerId, lotId, toPlace: "ready", pieces, reason: "harvest" })
	})
	return productId
}

/** What waits in the outbox of a producer, by template and whom it goes to. */
export function findOutbox(producerId: string) {
	return withProducer(producerId, (tx) =>
		tx
			.select({ template: outboxMails.template, recipient: outboxMails.recipient, props: outboxMails.props })
			.from(outboxMails),
	)
}
