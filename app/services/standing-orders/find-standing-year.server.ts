import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"
import { linesOnDate } from "~/domain/standing-orders/lines-on-date"
import { findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { readStoreStandingOrder, type StandingLine, type StandingOrder } from "./read-standing-orders.server"
import { type DueDate, standingDates } from "./standing-dates.server"

const A_YEAR = 365
/** Weekly dates of a year, and a few to be sure that the last is past it. */
const DATES_OF_A_YEAR = 60

type YearDate = DueDate & { lines: StandingLine[] }

/** Cases of one product by standing order in this calendar year: in orders made so far, and on the dates to come. */
type SeasonTotal = { productId: string; code: string; name: string; madeCases: number; comingCases: number }

type StandingYear = {
	standing: StandingOrder | null
	today: Day
	zone: string
	/** The dates of the next twelve months, skipped ones among them. */
	dates: YearDate[]
	season: { year: string; madeDates: number; comingDates: number; totals: SeasonTotal[] }
}

/** A store's standing order over the next twelve months, and what it comes to in this calendar year, read at one moment. */
export function findStandingYear(query: {
	producerId: string
	storeId: string
	now: Date
	zone: string
}): Promise<StandingYear> {
	return readProducer(query.producerId, async (tx) => {
		const standing = await readStoreStandingOrder(tx, query)
		const schedule = await findDeliverySchedule(tx, query)
		const { today, zone } = schedule
		const last = addDays(today, A_YEAR)
		const due = standing ? standingDates(standing, schedule, DATES_OF_A_YEAR) : []
		const dates = due
			.filter((date) => date.deliveryOn <= last)
			.map((date) => ({ ...date, lines: linesOnDate(standing?.lines ?? [], standing?.changes ?? [], date.ruleOn) }))
		const year = today.slice(0, 4)
		const coming = dates.filter((date) => date.isOpen && !date.isSkipped && date.deliveryOn.startsWith(year))
		const made = await findMade(tx, { ...query, year })
		const totals = new Map(made.totals.map((total) => [total.productId, { ...total, comingCases: 0 }]))
		const names = await findNames(tx, { producerId: query.producerId, ids: standing?.lines ?? [] })
		for (const { productId, cases } of coming.flatMap((date) => date.lines)) {
			const name = names.get(productId)
			const total = totals.get(productId) ?? (name && { ...name, madeCases: 0, comingCases: 0 })
			if (total) totals.set(productId, { ...total, comingCases: total.comingCases + cases })
		}
		return {
			standing,
			today,
			zone,
			dates,
			season: {
				year,
				madeDates: made.dates,
				comingDates: coming.length,
				totals: [...totals.values()].toSorted((a, b) => a.code.localeCompare(b.code, "en", { numeric: true })),
			},
		}
	})
}

type Name = { productId: string; code: string; name: string }

async function findMade(
	tx: Tx,
	query: { producerId: string; storeId: string; year: string },
): Promise<{ dates: number; totals: (Name & { madeCases: number })[] }> {
	const ofYear = sql`o.producer_id = ${query.producerId} and o.store_id = ${query.storeId}
		and o.standing_order_id is not null and o.state <> 'cancelled'
		and o.delivery_on between ${`${query.year}-01-01`} and ${`${query.year}-12-31`}`
	const { rows: counts } = await tx.execute<{ dates: number }>(
		sql`select count(*)::int as dates from orders o where ${ofYear}`,
	)
	const { rows } = await tx.execute<Name & { madeCases: number }>(sql`
		select l.product_id as "productId", p.code, p.name, sum(l.asked_cases)::int as "madeCases"
		from orders o
		join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		where ${ofYear}
		group by l.product_id, p.code, p.name`)
	return { dates: counts[0]?.dates ?? 0, totals: rows }
}

async function findNames(
	tx: Tx,
	query: { producerId: string; ids: readonly { productId: string }[] },
): Promise<Map<string, Name>> {
	const ids = query.ids.map((line) => line.productId)
	const { rows } = await tx.execute<Name>(sql`
		select id as "productId", code, name from products
		where producer_id = ${query.producerId} and id = any(${sql.param(ids)}::uuid[])`)
	return new Map(rows.map((row) => [row.productId, row]))
}
