import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { memberships, orderMessages, users } from "~/db/schema"
import { withPlatform, withProducer } from "~/db/transaction.server"
import { findTimeline } from "~/services/messages/find-timeline.server"
import { writeMessage } from "~/services/messages/write-message.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { findLettersOff, setLettersOff } from "~/services/people/set-letters-off.server"
import { addHand, orderAt, place, producerOf, standOnThursday } from "../desk/desk-steps"
import { addProduct, findOutbox, openStore, openYard, type Shop, type Yard } from "../orders/place-yard"

standOnThursday()

/** A yard with Ida at its desk, a store with Rosa and Sam, and one order. */
async function ordered() {
	const yard = await openYard()
	const shop = await openStore(yard)
	const { producerId } = yard
	const ida = { id: await addHand(), name: "Ida" }
	const sam = { id: randomUUID(), email: `sam-${randomUUID()}@plume.example.test` }
	await withPlatform((tx) => tx.insert(users).values({ ...sam, name: "Sam Hale" }))
	await withProducer(producerId, (tx) =>
		tx.insert(memberships).values([
			{ producerId, userId: ida.id, role: "desk" },
			{ producerId, userId: sam.id, role: "buyer", storeId: shop.storeId },
			{ producerId, userId: sam.id, role: "payer", storeId: shop.storeId },
		]),
	)
	const round = await addProduct(yard, { code: "11", readyCases: 9 })
	const number = await place(shop, [round, 2])
	return { yard, shop, ida, sam, number }
}

const fromDesk = (yard: Yard, number: number, ida: { id: string; name: string }, body: string, key = randomUUID()) =>
	writeMessage({ producer: producerOf(yard), number, writer: { side: "desk", person: ida }, body, idempotencyKey: key })

const fromStore = (yard: Yard, shop: Shop, number: number, body: string, key = randomUUID()) =>
	writeMessage({
		producer: producerOf(yard),
		number,
		writer: { side: "store", storeId: shop.storeId, person: { id: shop.person.id, name: "Rosa Quill" } },
		body,
		idempotencyKey: key,
	})

const sentTo = async (yard: Yard, template: string) =>
	(await findOutbox(yard.producerId))
		.filter((mail) => mail.template === template)
		.map((mail) => (mail.props as { sentTo: string }).sentTo)
		.toSorted()

describe("messages about an order", () => {
	test("stand in the timeline of both sides among the steps, and go to the other side by letter", async () => {
		const { yard, shop, ida, number } = await ordered()
		expect(await fromDesk(yard, number, ida, "The van comes at seven.")).toMatchObject({ ok: true })
		expect(await fromStore(yard, shop, number, "Fine.\nBack door.")).toMatchObject({ ok: true })
		const both = await findTimeline({ producerId: yard.producerId, number })
		const store = await findTimeline({ producerId: yard.producerId, number, storeId: shop.storeId })
		expect(store).toEqual(both)
		expect(both.entries.map(({ kind, side, who, body }) => [kind, side, who, body])).toEqual([
			["placed", null, "Rosa Quill", null],
			["message", "desk", "Ida", "The van comes at seven."],
			["message", "store", "Rosa Quill", "Fine.\nBack door."],
		])
		expect(await sentTo(yard, "order-message")).toHaveLength(3)
	})

	test("sent twice by a double press are one message and one letter each", async () => {
		const { yard, ida, number } = await ordered()
		const key = randomUUID()
		const [first, second] = await Promise.all([
			fromDesk(yard, number, ida, "Once.", key),
			fromDesk(yard, number, ida, "Once.", key),
		])
		expect(first).toEqual(second)
		expect((await findTimeline({ producerId: yard.producerId, number })).entries).toHaveLength(2)
		expect(await sentTo(yard, "order-message")).toHaveLength(2)
	})

	test("are for the store that ordered: another store sees none and writes none", async () => {
		const { yard, number } = await ordered()
		const other = await openStore(yard)
		expect(await fromStore(yard, other, number, "Hello")).toEqual({ ok: false, reason: "no-such-order" })
		const seen = await findTimeline({ producerId: yard.producerId, number, storeId: other.storeId })
		expect(seen).toEqual({ entries: [], earlier: null })
	})

	test("cannot be altered or taken out afterwards", async () => {
		const { yard, ida, number } = await ordered()
		await fromDesk(yard, number, ida, "Said.")
		const alter = withProducer(yard.producerId, (tx) => tx.update(orderMessages).set({ body: "Unsaid." }))
		await expect(alter).rejects.toThrow()
		await expect(withProducer(yard.producerId, (tx) => tx.delete(orderMessages))).rejects.toThrow()
	})

	test("page by key when there are many, with none shown twice or left out", async () => {
		const { yard, ida, number } = await ordered()
		const { producerId } = yard
		await withProducer(producerId, (tx) =>
			tx.execute(sql`
				insert into order_messages (producer_id, order_id, side, body, written_by, written_at)
				select ${producerId}, o.id, 'desk', 'Line ' || n, ${ida.id}, '2026-08-14T12:00:00Z'::timestamptz + (n / 3) * interval '1 second'
				from orders o, generate_series(1, 95) n where o.producer_id = ${producerId} and o.number = ${number}`),
		)
		const seen: string[] = []
		let before: string | null = null
		for (let pages = 0; pages < 9; pages += 1) {
			const page: Awaited<ReturnType<typeof findTimeline>> = await findTimeline({ producerId, number, before })
			seen.unshift(...page.entries.map(({ id }) => id))
			before = page.earlier
			if (!before) break
		}
		expect(seen).toHaveLength(96)
		expect(new Set(seen).size).toBe(96)
		const odd = await findTimeline({ producerId, number, before: "'; drop table" })
		expect(odd.entries).toHaveLength(40)
	})
})

describe("the letters a person wants", () => {
	test("are chosen for themselves alone, and hold for what the store is told from then on", async () => {
		const { yard, shop, ida, sam, number } = await ordered()
		const own = { producerId: yard.producerId, storeId: shop.storeId, personId: sam.id }
		await setLettersOff({ ...own, off: ["confirmations", "messages"] })
		expect(await findLettersOff(own)).toEqual(["confirmations", "messages"])
		expect(await findLettersOff({ ...own, personId: shop.person.id })).toEqual([])

		await fromDesk(yard, number, ida, "The van comes at seven.")
		await confirmOrder({ producer: producerOf(yard), number, personId: ida.id, given: [] })
		expect(await sentTo(yard, "order-message")).toEqual([shop.person.email])
		expect(await sentTo(yard, "order-confirmed")).toEqual([shop.person.email])

		await setLettersOff({ ...own, personId: shop.person.id, off: ["messages"] })
		await fromDesk(yard, number, ida, "Nobody wants this, so all of you get it.")
		expect((await sentTo(yard, "order-message")).filter((to) => to === sam.email)).toHaveLength(1)
		expect((await orderAt(yard, number)).state).toBe("confirmed")
	})
})
