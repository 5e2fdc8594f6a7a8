import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Period } from "~/domain/books/period"
import type { Day } from "~/domain/calendar"
import { type SoldSpan, type Span, spanFor } from "~/domain/figures/spans"
import { findCropSold, type SoldCrop } from "./find-crop-sold.server"
import {
	type Channel,
	findChannels,
	findProducts,
	findSpans,
	findStores,
	type SoldProduct,
	type SoldStore,
} from "./find-sales.server"
import { findSleeping, type SleepingStore } from "./find-sleeping.server"

/** How many stores the page draws; the file has all. */
const MOST_STORES = 20

export type Figures = {
	span: Span
	spans: SoldSpan[]
	products: SoldProduct[]
	stores: SoldStore[]
	/** How many stores bought, of which the first are in `stores`. */
	storeCount: number
	channels: Channel[]
	crop: SoldCrop[]
	sleeping: SleepingStore[]
	/** The first season that anything is known of. */
	firstSeason: number
	/** Credits given in the period: the figures are what was invoiced, before them. */
	creditedCents: number
}

/** What was sold in a period by time, product, store and channel, where the crop is, and which stores sleep. */
export function findFigures(query: Period & { producerId: string; today: Day; quietWeeks: number }): Promise<Figures> {
	const span = spanFor(query)
	return readProducer(query.producerId, async (tx) => {
		const { stores, count } = await findStores(tx, query, MOST_STORES)
		return {
			span,
			spans: await findSpans(tx, query, span),
			products: await findProducts(tx, query),
			stores,
			storeCount: count,
			channels: await findChannels(tx, query),
			crop: await findCropSold(tx, query),
			sleeping: await findSleeping(tx, query),
			...(await findBounds(tx, query)),
		}
	})
}

async function findBounds(tx: Tx, query: Period & { producerId: string; today: Day }) {
	const { producerId, from, to, today } = query
	const { rows } = await tx.execute<{ first: Day | null; credited: string }>(sql`
		select least(
				(select min(issued_on) from invoices where producer_id = ${producerId}),
				(select min(market_on) from market_days where producer_id = ${producerId}),
				(select min(harvested_on) from lots where producer_id = ${producerId})
			)::text as first,
			(select coalesce(sum(lines_cents), 0) from credits
				where producer_id = ${producerId} and issued_on between ${from}::date and ${to}::date) as credited`)
	const [row] = rows
	return {
		firstSeason: Number((row?.first ?? today).slice(0, 4)),
		creditedCents: Number(row?.credited ?? 0),
	}
}
