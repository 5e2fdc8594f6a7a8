import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { ForecastWeek } from "~/domain/crop/hindsight"

/** A product of which something was expected or came off. */
type ForecastProduct = { id: string; name: string; detail: string; piecesPerCase: number }

type ForecastComparison = {
	products: ForecastProduct[]
	years: number[]
	/** The product and year shown; null when nothing was ever expected. */
	shown: { product: ForecastProduct; year: number; weeks: ForecastWeek[] } | null
}

/** A forecast that was made earlier than so many days before its time had come says nothing of two or four weeks ahead. */
const STALE_DAYS = 7

/**
 * What was expected of each past week, two and four weeks before its Monday, against what came off the hives in it. Of one
 * product and year; left out or unknown, the first product and the latest year. A forecast counts as made two weeks ahead
 * when it is the last one of the week that ended then.
 */
export function compareForecasts(query: {
	producerId: string
	today: Day
	productId: string | null
	year: number | null
}): Promise<ForecastComparison> {
	const { producerId, today } = query
	return readProducer(producerId, async (tx) => {
		const { rows: products } = await tx.execute<ForecastProduct>(sql`
			select p.id, p.name, p.detail, p.pieces_per_case as "piecesPerCase" from products p
			where p.producer_id = ${producerId} and (
				exists (select from crop_forecasts f where f.producer_id = p.producer_id and f.product_id = p.id)
				or exists (select from supers s where s.producer_id = p.producer_id and s.product_id = p.id and s.state = 'off')
			)
			order by p.code`)
		const { rows: years } = await tx.execute<{ year: number }>(sql`
			select distinct extract(year from on_day)::int as year from (
				select week_on as on_day from crop_forecasts where producer_id = ${producerId} and week_on <= ${today}::date
				union select off_on from supers where producer_id = ${producerId} and state = 'off'
			) as days order by year desc`)
		const product = products.find(({ id }) => id === query.productId) ?? products[0]
		const year = years.find((one) => one.year === query.year)?.year ?? years[0]?.year
		const shown =
			product && year
				? { product, year, weeks: await readWeeks(tx, { producerId, today, productId: product.id, year }) }
				: null
		return { products, years: years.map((one) => one.year), shown }
	})
}

type WeekRow = {
	weekOn: Day
	cameOff: number
	twoAhead: ForecastWeek["twoAhead"]
	fourAhead: ForecastWeek["fourAhead"]
}

async function readWeeks(
	tx: Tx,
	query: { producerId: string; today: Day; productId: string; year: number },
): Promise<ForecastWeek[]> {
	const { producerId, today, productId, year } = query
	const [from, to] = [`${year}-01-01`, `${year}-12-31`]
	const madeBefore = (days: number) => sql`(
		select json_build_object('madeOn', f.made_on::text, 'low', f.low_pieces, 'likely', f.likely_pieces,
			'high', f.high_pieces)
		from crop_forecasts f
		where f.producer_id = ${producerId} and f.product_id = ${productId} and f.week_on = w.week_on
			and f.made_on <= w.week_on - ${days}::int and f.made_on > w.week_on - ${days + STALE_DAYS}::int
		order by f.made_on desc limit 1
	)`
	const { rows } = await tx.execute<WeekRow>(sql`
		with off as (
			select date_trunc('week', s.off_on)::date as week_on, sum(coalesce(s.finished_pieces, 0))::int as pieces
			from supers s
			where s.producer_id = ${producerId} and s.product_id = ${productId} and s.state = 'off'
				and s.off_on between ${from} and ${to}
			group by 1
		), w as (
			select distinct f.week_on from crop_forecasts f
			where f.producer_id = ${producerId} and f.product_id = ${productId}
				and f.week_on between ${from} and ${to} and f.week_on + 6 < ${today}::date
			union select week_on from off where week_on + 6 < ${today}::date
		)
		select w.week_on::text as "weekOn", coalesce(off.pieces, 0) as "cameOff",
			${madeBefore(14)} as "twoAhead", ${madeBefore(28)} as "fourAhead"
		from w left join off on off.week_on = w.week_on
		order by w.week_on`)
	return rows
}
