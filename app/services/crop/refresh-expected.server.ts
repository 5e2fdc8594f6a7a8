import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { FINISH_QUANTILES, type FinishRecord, finishSharesByStage, STAGE_BOUNDS } from "~/domain/crop/finish-shares"
import { type ExpectedSupply, expectedByDay, expectedByWeek } from "~/domain/crop/forecast"
import type { SuperFacts } from "~/domain/crop/super-facts"
import { lockProducts } from "~/services/orders/lock-products.server"
import { lastChecksOf } from "./last-checks.server"

/**
 * Works out anew what should come off the hives, in the caller's transaction: one row for each product and day in
 * `expected_supplies`, which free to promise reads, and what is expected as of `today` in `crop_forecasts`, by week. Call it
 * after a check, after supers were set on, marked or taken off, and after the ready share was changed. `productIds`
 * narrows it to products whose supers have changed; they are locked, by id, until the transaction ends.
 */
export async function refreshExpected(
	tx: Tx,
	query: { producerId: string; today: Day; productIds?: readonly string[] },
): Promise<void> {
	const { producerId, today } = query
	const productIds = query.productIds ?? (await productsWithCrop(tx, query))
	if (productIds.length === 0) return
	await lockProducts(tx, { producerId, productIds })
	const [supers, records, settings] = [
		await findSupers(tx, { producerId, productIds }),
		await findFinishRecords(tx, producerId),
		await tx.execute<{ ready: number }>(
			sql`select ready_capped_percent as ready from producer_settings where producer_id = ${producerId}`,
		),
	]
	const days = expectedByDay(supers, {
		today,
		readyCappedPercent: settings.rows[0]?.ready ?? 90,
		sharesByStage: finishSharesByStage(records),
	})
	await writeDays(tx, { producerId, productIds, days })
	await writeForecast(tx, { producerId, productIds, today, weeks: expectedByWeek(days) })
}

async function productsWithCrop(tx: Tx, query: { producerId: string; today: Day }): Promise<string[]> {
	const { producerId, today } = query
	const { rows } = await tx.execute<{ id: string }>(sql`
		select product_id as id from supers where producer_id = ${producerId} and state <> 'off'
		union select product_id from expected_supplies where producer_id = ${producerId}
		union select product_id from crop_forecasts where producer_id = ${producerId} and made_on = ${today}`)
	return rows.map(({ id }) => id)
}

type SuperRow = SuperFacts & { productId: string }

async function findSupers(tx: Tx, query: { producerId: string; productIds: readonly string[] }): Promise<SuperRow[]> {
	const { producerId, productIds } = query
	const { rows } = await tx.execute<SuperRow>(sql`
		select s.product_id as "productId", s.capacity_pieces as "capacityPieces", s.set_on::text as "setOn", s.state,
			s.clearing_on::text as "clearingOn", c.checks
		from supers s
		cross join lateral ${lastChecksOf("s")} c
		where s.producer_id = ${producerId} and s.product_id = any(${sql.param(productIds)}::uuid[]) and s.state <> 'off'`)
	return rows
}

/** What became of the producer's supers, by the stages they were seen at; each counts once at a stage. */
async function findFinishRecords(tx: Tx, producerId: string): Promise<FinishRecord[]> {
	const { rows } = await tx.execute<{ stage: number; supers: number; shares: [number, number, number] }>(sql`
		with seen as (
			select distinct s.id, s.finished_pieces::float8 / s.capacity_pieces as share,
				width_bucket((c.filled_percent + c.capped_percent) / 2.0::float8, ${sql.param(STAGE_BOUNDS)}::float8[]) as stage
			from supers s
			join super_checks c on c.producer_id = s.producer_id and c.super_id = s.id
			where s.producer_id = ${producerId} and s.state = 'off' and s.finished_pieces is not null
		)
		select stage, count(*)::int as supers,
			percentile_cont(${sql.param(FINISH_QUANTILES)}::float8[]) within group (order by share) as shares
		from seen group by stage`)
	return rows.map(({ stage, supers, shares: [low, likely, high] }) => ({ stage, supers, low, likely, high }))
}

async function writeDays(
	tx: Tx,
	facts: { producerId: string; productIds: readonly string[]; days: readonly ExpectedSupply[] },
): Promise<void> {
	const { producerId, productIds, days } = facts
	await tx.execute(sql`
		delete from expected_supplies
		where producer_id = ${producerId} and product_id = any(${sql.param(productIds)}::uuid[])`)
	if (days.length === 0) return
	await tx.execute(sql`
		insert into expected_supplies (producer_id, product_id, expected_on, low_pieces, likely_pieces, high_pieces)
		select ${producerId}, "productId", "on", low, likely, high from ${asRows(days)}`)
}

/** A snapshot of today is written over by a later one of the same day; a week that is no longer expected goes to nothing. */
async function writeForecast(
	tx: Tx,
	facts: { producerId: string; productIds: readonly string[]; today: Day; weeks: readonly ExpectedSupply[] },
): Promise<void> {
	const { producerId, productIds, today, weeks } = facts
	await tx.execute(sql`
		insert into crop_forecasts (producer_id, product_id, made_on, week_on, low_pieces, likely_pieces, high_pieces)
		select ${producerId}, product_id, ${today}::date, week_on, sum(low), sum(likely), sum(high)
		from (
			select "productId" as product_id, "on" as week_on, low, likely, high from ${asRows(weeks)}
			union all
			select product_id, week_on, 0, 0, 0 from crop_forecasts
			where producer_id = ${producerId} and made_on = ${today} and product_id = any(${sql.param(productIds)}::uuid[])
		) as parts
		group by product_id, week_on
		on conflict on constraint crop_forecasts_pk do update
		set low_pieces = excluded.low_pieces, likely_pieces = excluded.likely_pieces, high_pieces = excluded.high_pieces`)
}

const asRows = (supplies: readonly ExpectedSupply[]) =>
	sql`json_to_recordset(${JSON.stringify(supplies)}::json)
		as given("productId" uuid, "on" date, low integer, likely integer, high integer)`
