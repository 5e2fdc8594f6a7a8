import { and, asc, eq, gte, isNotNull, lte, ne } from "drizzle-orm"
import { marketDays, markets, producerSettings, products } from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import { addDays, type Day, dayInZone } from "~/domain/calendar"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { now } from "~/platform/clock.server"
import { findOutlooks, type ProductOutlook } from "~/services/promise/find-outlooks.server"
import { findTable } from "~/services/stall/find-table.server"

/** A market day on which the public can buy. */
export type PickUpDay = {
	id: string
	on: Day
	state: "planned" | "open" | "closed"
	marketName: string
	address: string
	opensAt: string
	closesAt: string
}

/** One product of the shop, in pieces, as it stands for the chosen day. */
export type ShopItem = {
	productId: string
	code: string
	name: string
	detail: string
	colour: "straw" | "light" | "amber" | "dark"
	form: (typeof products.$inferSelect)["form"]
	pieceCents: number
	/** Pieces kept for stall and shop; on a market day that is open, those that were brought. */
	kept: number
	/** How many of them can still be had on the day; never more than are kept. */
	left: number
	/** When there is more, where none is left, and how much. */
	nextOn: Day | null
	nextPieces: number
}

export type ShopFront = {
	headline: string
	words: string
	contact: { address: string; email: string; phone: string }
	days: PickUpDay[]
	/** The market day that the figures are of; null where none is ahead, and they are of today. */
	chosen: PickUpDay | null
	items: ShopItem[]
}

const DAYS_AHEAD = 14
/** As many as fit side by side. */
const MOST_DAYS = 3

/**
 * What the public sees: what is in season and how much is left for a market day. While that day is open, it is what
 * stands on its table. Before, stores' promises come first, and of what remains the public gets what the producer keeps for
 * stall and shop. `dayId` is the id of a market day; an unknown one is answered with the next.
 */
export function findShopFront(query: {
	producer: { id: string; timeZone: string }
	dayId: string | null
}): Promise<ShopFront> {
	const { producer, dayId } = query
	const today = dayInZone(now(), producer.timeZone)
	return readProducer(producer.id, async (tx) => {
		const [settings] = await tx.select().from(producerSettings).where(eq(producerSettings.producerId, producer.id))
		const days = await findPickUpDays(tx, { producerId: producer.id, today })
		const chosen = days.find((day) => day.id === dayId) ?? days[0] ?? null
		const sold = await tx
			.select()
			.from(products)
			.where(and(eq(products.producerId, producer.id), eq(products.isActive, true), isNotNull(products.pieceCents)))
			.orderBy(asc(products.code))
		const outlooks = await findOutlooks(tx, { producerId: producer.id, today })
		const table = chosen?.state === "open" ? await findTable(tx, { producerId: producer.id, dayId: chosen.id }) : null
		const stockOf = (product: { id: string; reservePieces: number }) => {
			const onTable = table?.find(({ productId }) => productId === product.id)
			const ahead = stockAhead(outlooks.get(product.id), chosen?.on ?? today)
			if (!table) return { ...ahead, kept: product.reservePieces }
			return { ...ahead, kept: onTable?.brought ?? 0, left: onTable?.left ?? 0 }
		}
		return {
			headline: settings?.shopHeadline ?? "",
			words: settings?.shopWords ?? "",
			contact: { address: settings?.address ?? "", email: settings?.email ?? "", phone: settings?.phone ?? "" },
			days,
			chosen,
			items: sold.map((product) => ({
				productId: product.id,
				code: product.code,
				name: product.name,
				detail: product.detail,
				colour: product.colour,
				form: product.form,
				pieceCents: product.pieceCents ?? 0,
				...stockOf(product),
			})),
		}
	})
}

function findPickUpDays(tx: Tx, query: { producerId: string; today: Day }): Promise<PickUpDay[]> {
	return tx
		.select({
			id: marketDays.id,
			on: marketDays.marketOn,
			state: marketDays.state,
			marketName: markets.name,
			address: markets.address,
			opensAt: markets.opensAt,
			closesAt: markets.closesAt,
		})
		.from(marketDays)
		.innerJoin(markets, and(eq(markets.producerId, marketDays.producerId), eq(markets.id, marketDays.marketId)))
		.where(
			and(
				eq(marketDays.producerId, query.producerId),
				ne(marketDays.state, "closed"),
				gte(marketDays.marketOn, query.today),
				lte(marketDays.marketOn, addDays(query.today, DAYS_AHEAD)),
			),
		)
		.orderBy(asc(marketDays.marketOn), asc(markets.name), asc(marketDays.id))
		.limit(MOST_DAYS)
}

/**
 * What is free for the public on `day` without breaking a promise to a store, and when there is more: sure supply counts
 * for what is left, expected supply only for what is to come.
 */
function stockAhead(outlook: ProductOutlook | undefined, day: Day): Pick<ShopItem, "left" | "nextOn" | "nextPieces"> {
	if (!outlook) return { left: 0, nextOn: null, nextPieces: 0 }
	const sure = outlook.supplies.filter((supply) => supply.kind !== "expected")
	const [free] = freeToPromise({ ...outlook, supplies: sure, reserve: 0, days: [day] })
	const later = outlook.supplies
		.map(({ on }) => on)
		.filter((on) => on > day)
		.toSorted()
	const next = freeToPromise({ ...outlook, reserve: 0, days: later }).find((entry) => entry.free > 0)
	const nextPieces = Math.min(outlook.reserve, next?.free ?? 0)
	return {
		left: Math.min(outlook.reserve, free?.free ?? 0),
		nextOn: nextPieces > 0 ? (next?.day ?? null) : null,
		nextPieces,
	}
}
