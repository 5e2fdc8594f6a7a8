import { and, asc, eq, exists, gte, lte, sql } from "drizzle-orm"
import { marketDayPeople, marketDays, markets } from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"

/** Who asks: a volunteer sees the days they are named on, owner and desk see all. */
export type StallViewer = { personId: string; seesEveryDay: boolean }

export type MarketDay = {
	id: string
	on: Day
	state: "planned" | "open" | "closed"
	floatCents: number
	marketName: string
	address: string
	opensAt: string
	closesAt: string
	readerId: string
}

const columns = {
	id: marketDays.id,
	on: marketDays.marketOn,
	state: marketDays.state,
	floatCents: marketDays.floatCents,
	marketName: markets.name,
	address: markets.address,
	opensAt: markets.opensAt,
	closesAt: markets.closesAt,
	readerId: markets.readerId,
}

/** The days a stall's list goes back and ahead. */
const DAYS_BACK = 7
const DAYS_AHEAD = 28

/** The market days around `today` that the viewer may see, earliest first. */
export function listMarketDays(query: { producerId: string; today: Day; viewer: StallViewer }): Promise<MarketDay[]> {
	const { producerId, today, viewer } = query
	return readProducer(producerId, (tx) =>
		selectDays(tx)
			.where(
				and(
					eq(marketDays.producerId, producerId),
					gte(marketDays.marketOn, addDays(today, -DAYS_BACK)),
					lte(marketDays.marketOn, addDays(today, DAYS_AHEAD)),
					maySee(tx, viewer),
				),
			)
			.orderBy(asc(marketDays.marketOn), asc(markets.name), asc(marketDays.id)),
	)
}

/** One market day, or null when there is none or the viewer is not named on it. */
export async function findMarketDay(
	tx: Tx,
	query: { producerId: string; dayId: string; viewer: StallViewer },
): Promise<MarketDay | null> {
	const [day] = await selectDays(tx).where(
		and(eq(marketDays.producerId, query.producerId), eq(marketDays.id, query.dayId), maySee(tx, query.viewer)),
	)
	return day ?? null
}

function selectDays(tx: Tx) {
	return tx
		.select(columns)
		.from(marketDays)
		.innerJoin(markets, and(eq(markets.producerId, marketDays.producerId), eq(markets.id, marketDays.marketId)))
}

function maySee(tx: Tx, viewer: StallViewer) {
	if (viewer.seesEveryDay) return undefined
	return exists(
		tx
			.select({ one: sql`1` })
			.from(marketDayPeople)
			.where(
				and(
					eq(marketDayPeople.producerId, marketDays.producerId),
					eq(marketDayPeople.marketDayId, marketDays.id),
					eq(marketDayPeople.userId, viewer.personId),
				),
			),
	)
}
