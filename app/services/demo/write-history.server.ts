import { inArray } from "drizzle-orm"
import * as schema from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { insertAll } from "./insert-all.server"
import type { History } from "./plan-history.server"

/** Hives, supers, checks and harvests: what lots refer to. */
export async function writeCrop(tx: Tx, { yards, harvests, uploads, forecasts }: History): Promise<void> {
	await insertAll(tx, schema.yards, yards.rows.yards)
	await insertAll(tx, schema.hives, yards.rows.hives)
	await insertAll(tx, schema.harvests, harvests.harvests)
	await insertAll(tx, schema.supers, [...yards.rows.supers, ...harvests.supers])
	await insertAll(tx, schema.uploads, uploads)
	await insertAll(tx, schema.superChecks, [...yards.rows.checks, ...harvests.checks])
	await insertAll(tx, schema.cropForecasts, forecasts)
}

/** What was done with lots until their release. */
export async function writeReleases(tx: Tx, history: History): Promise<void> {
	const { gradings, coldRoom, weighings, releases, regrouping } = history
	await insertAll(tx, schema.gradeSchemes, gradings.schemes)
	await insertAll(tx, schema.gradings, gradings.gradings)
	await insertAll(tx, schema.freezerLoads, coldRoom.rows.loads)
	await insertAll(tx, schema.freezerLoadLots, coldRoom.rows.loadLots)
	await insertAll(tx, schema.freezeProofs, coldRoom.rows.proofs)
	await insertAll(tx, schema.netChecks, weighings.rows)
	await insertAll(tx, schema.lotReleases, releases)
	await insertAll(tx, schema.lotLinks, regrouping.links)
}

/** Counts and the withdrawal. Comes after the moves, as nothing leaves the shelves of a lot that is withdrawn. */
export async function writeCounts(tx: Tx, { takes, withdrawal }: History): Promise<void> {
	await insertAll(tx, schema.stockTakes, takes.takes)
	await insertAll(tx, schema.stockTakeLines, takes.lines)
	await insertAll(tx, schema.withdrawals, withdrawal.withdrawals)
	await insertAll(tx, schema.withdrawalLots, withdrawal.lots)
	await insertAll(tx, schema.withdrawalNotices, withdrawal.notices)
	const lotIds = withdrawal.lots.map(({ lotId }) => lotId)
	await tx.update(schema.lots).set({ state: "withdrawn" }).where(inArray(schema.lots.id, lotIds))
}
