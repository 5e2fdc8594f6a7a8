import { type SQL, sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { CombForm } from "~/domain/grading/grade-comb"
import type { OffSuper } from "~/domain/lots/plan-harvest"

/** A super on a hive, as it is chosen to come off. */
export type HarvestSuper = OffSuper & {
	yardName: string
	flora: string
	hiveLabel: string
	level: number
	isClearing: boolean
	productCode: string
	productName: string
	productDetail: string
	productForm: CombForm
	/** The latest check; null where nobody has looked. */
	checkedOn: Day | null
	cappedPercent: number | null
	/** Capped to the share that the producer calls ready. */
	isReady: boolean
}

/** The most supers shown at once. */
const MOST = 400

/**
 * Supers on hives, the ready ones first, then by how far they are capped: of one yard, or those named by `ids`, locked
 * until the transaction ends when `lock` says so.
 */
export async function readSupers(
	tx: Tx,
	query: { producerId: string; yardId?: string | null; ids?: readonly string[]; lock?: boolean },
): Promise<HarvestSuper[]> {
	const { producerId, yardId, ids, lock = false } = query
	const ofYard = yardId ? sql`and y.id = ${yardId}` : sql``
	const named = ids ? sql`and s.id = any(${sql.param(ids)}::uuid[])` : sql``
	if (lock) {
		await tx.execute(sql`
			select s.id from supers s where s.producer_id = ${producerId} ${named} order by s.id for no key update`)
	}
	const { rows } = await tx.execute<Omit<HarvestSuper, "label">>(sql`
		${selectSupers}
		where s.producer_id = ${producerId} and s.state <> 'off' ${ofYard} ${named}
		order by "isReady" desc, c.capped_percent desc nulls last, y.name, h.label, s.level desc, s.id
		limit ${MOST}`)
	return rows.map((row) => ({ ...row, label: `Hive ${row.hiveLabel}, super ${row.level}` }))
}

const selectSupers: SQL = sql`
	select s.id, s.product_id as "productId", s.capacity_pieces as "capacityPieces", s.set_on::text as "setOn", s.level,
		s.state = 'clearing' as "isClearing", y.name as "yardName", y.flora, h.label as "hiveLabel",
		p.code as "productCode", p.name as "productName", p.detail as "productDetail", p.form as "productForm",
		c.checked_on::text as "checkedOn", c.capped_percent as "cappedPercent",
		coalesce(c.capped_percent >= t.ready_capped_percent, false) as "isReady"
	from supers s
	join hives h on h.producer_id = s.producer_id and h.id = s.hive_id
	join yards y on y.producer_id = h.producer_id and y.id = h.yard_id
	join products p on p.producer_id = s.producer_id and p.id = s.product_id
	left join producer_settings t on t.producer_id = s.producer_id
	left join lateral (
		select k.checked_on, k.capped_percent from super_checks k
		where k.producer_id = s.producer_id and k.super_id = s.id
		order by k.checked_on desc, k.received_at desc, k.id desc limit 1
	) c on true`
