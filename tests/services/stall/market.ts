import { randomUUID } from "node:crypto"
import { eq, sql } from "drizzle-orm"
import {
	lots,
	marketDayPeople,
	marketDays,
	markets,
	producerSettings,
	producers,
	products,
	stockBalances,
	stockMoves,
	users,
} from "~/db/schema"
import { readProducer, withPlatform, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Form } from "~/domain/stall/short-names"

export const READER = "tmr_demo_stall"
export const ZONE = "America/New_York"

export type Market = {
	producerId: string
	slug: string
	marketId: string
	dayId: string
	/** A volunteer who is named on the day. */
	viewer: { personId: string; seesEveryDay: boolean }
}

/** A producer with a market, one day of it, and a volunteer named on that day. */
export async function openMarket(
	day: { state?: "planned" | "open" | "closed"; on?: Day; readerId?: string } = {},
): Promise<Market> {
	const [producerId, marketId, dayId, personId] = [randomUUID(), randomUUID(), randomUUID(), randomUUID()]
	const slug = `yard-${producerId.slice(0, 8)}`
	await withPlatform((tx) =>
		tx.insert(users).values({ id: personId, name: "June Fennimore", email: `${personId}@larkmoor.example.test` }),
	)
	await withProducer(producerId, async (tx) => {
		await tx.insert(producers).values({ id: producerId, slug, name: "Larkmoor Bee Yard", timeZone: ZONE })
		await tx.insert(producerSettings).values({ producerId, email: "orders@larkmoor.example.test" })
		await tx.insert(markets).values({
			producerId,
			id: marketId,
			name: "Old Quay Market",
			opensAt: "09:00",
			closesAt: "13:00",
			readerId: day.readerId ?? READER,
		})
		await tx.insert(marketDays).values({
			producerId,
			id: dayId,
			marketId,
			marketOn: day.on ?? "2026-08-15",
			state: day.state ?? "open",
			floatCents: 8_000,
		})
		await tx.insert(marketDayPeople).values({ producerId, marketDayId: dayId, userId: personId })
	})
	return { producerId, slug, marketId, dayId, viewer: { personId, seesEveryDay: false } }
}

export type NewProduct = {
	code: string
	form?: Form
	pieceCents?: number | null
	reservePieces?: number
	/** One lot for each figure, the first with the earliest best-before. */
	ready?: readonly number[]
	/** Pieces of these lots that were loaded out to the market day. */
	loaded?: readonly number[]
	state?: "held" | "released"
	/** When held lots are likely to be released. */
	expectedReleaseOn?: Day
}

/** A product with its lots at $14.00 a piece; answers its id and those of the lots. */
export async function addProduct(
	market: Market,
	product: NewProduct,
): Promise<{ productId: string; lotIds: string[] }> {
	const { producerId, dayId } = market
	const productId = randomUUID()
	const ready = product.ready ?? []
	const lotIds = ready.map(() => randomUUID())
	await withProducer(producerId, async (tx) => {
		await tx.insert(products).values({
			producerId,
			id: productId,
			code: product.code,
			name: `Round section ${product.code}`,
			form: product.form ?? "round",
			colour: "straw",
			detail: "Fancy, 8 oz",
			pieceNetGrams: 226,
			piecesPerCase: 12,
			breakFamily: "round",
			pieceCents: product.pieceCents === undefined ? 1_400 : product.pieceCents,
			reservePieces: product.reservePieces ?? 0,
		})
		for (const [index, pieces] of ready.entries()) {
			const lotId = lotIds[index] ?? ""
			await tx.insert(lots).values({
				producerId,
				id: lotId,
				code: `${product.code}-${index}`,
				productId,
				state: product.state ?? "released",
				harvestedOn: "2026-07-01",
				expectedReleaseOn: product.expectedReleaseOn ?? "2026-07-10",
				bestBeforeOn: `2028-0${index + 1}-01`,
				piecesHarvested: pieces,
			})
			const toPlace = product.state === "held" ? ("cold-room" as const) : ("ready" as const)
			await tx.insert(stockMoves).values({ producerId, lotId, toPlace, pieces, reason: "harvest" })
			const loaded = product.loaded?.[index] ?? 0
			if (loaded === 0) continue
			const out = { fromPlace: "ready" as const, toPlace: "market" as const, toRef: dayId }
			await tx.insert(stockMoves).values({ producerId, lotId, ...out, pieces: loaded, reason: "load-out" })
		}
	})
	return { productId, lotIds }
}

/** Where the pieces of a lot are now, places without any left out. */
export async function placesOf(producerId: string, lotId: string): Promise<Record<string, number>> {
	const rows = await readProducer(producerId, (tx) =>
		tx.select().from(stockBalances).where(eq(stockBalances.lotId, lotId)),
	)
	return Object.fromEntries(rows.filter(({ pieces }) => pieces > 0).map(({ place, pieces }) => [place, pieces]))
}

/** Lots of the producer whose pieces are not all somewhere: none, whatever happened. */
export async function lostLots(producerId: string): Promise<string[]> {
	const { rows } = await readProducer(producerId, (tx) =>
		tx.execute<{ code: string }>(sql`
			select l.code from lots l
			left join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			where l.producer_id = ${producerId}
			group by l.code, l.pieces_harvested
			having coalesce(sum(b.pieces), 0) <> l.pieces_harvested`),
	)
	return rows.map(({ code }) => code)
}
