import { createHash } from "node:crypto"
import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { unkeptPromises } from "~/domain/promise/unkept-promises"
import { wholeCases } from "~/domain/quantity"
import type { Claim, ClaimClass } from "~/domain/sharing/share-out"
import { caseStrips } from "~/services/orders/cases-on-day.server"
import { promiseDay } from "~/services/orders/find-most-cases.server"
import { findOutlooks, type ProductOutlook } from "~/services/promise/find-outlooks.server"

/** A line that is to be shared out, with all that the sharing needs to know of its store. */
export type SharingRow = {
	lineId: string
	orderId: string
	orderNumber: number
	storeId: string
	storeName: string
	askedCases: number
	/** Sure already; the claim is for the rest. */
	sureCases: number
	leastCases: number
	claimClass: ClaimClass
	weightPercent: number
	/** What the store got of this product when it was last short. */
	last: { asked: number; given: number; on: Day } | null
	/** Products with cases over that may stand in for it, the most welcome first. */
	substituteIds: string[]
}

export type Substitute = { productId: string; code: string; name: string; overCases: number }

/** One product and day to be shared out. */
export type SharingFacts = {
	product: { id: string; code: string; name: string; detail: string; piecesPerCase: number }
	deliveryOn: Day
	/** Cases that can be given besides all that is sure. */
	supply: number
	/** What comes too late for the day, where something is expected. */
	later: { cases: number; on: Day } | null
	/** What is promised for the day is more than will be there: lines that were promised share too. */
	isOverPromised: boolean
	/** The earlier order first. */
	rows: SharingRow[]
	substitutes: Substitute[]
	/** Names these facts: it changes with any figure that decides the sharing. */
	seen: string
}

type Line = Omit<SharingRow, "sureCases"> & {
	isToShare: boolean
	promisedCases: number
	piecesPerCase: number
}

/**
 * What is to be shared out of a product on a delivery day as it stands now: the undecided lines that are to be shared
 * out, for the cases beyond what is sure of them, and what can be ready for them. Where more is promised for the day
 * than will be there, every line that is not decided shares, and nothing of it is sure. Null when there is no such
 * product; no rows when nothing is to be shared. Lock the orders and products first where it decides anything.
 */
export async function readSharing(
	tx: Tx,
	query: { producerId: string; productCode: string; deliveryOn: Day; today: Day },
): Promise<SharingFacts | null> {
	const { producerId, productCode, deliveryOn, today } = query
	const {
		rows: [product],
	} = await tx.execute<SharingFacts["product"]>(sql`
		select id, code, name, detail, pieces_per_case as "piecesPerCase"
		from products where producer_id = ${producerId} and code = ${productCode}`)
	if (!product) return null
	const lines = await findLines(tx, { producerId, productId: product.id, deliveryOn })
	const substituteIds = [...new Set(lines.flatMap((line) => line.substituteIds))]
	const outlooks = await findOutlooks(tx, { producerId, today, productIds: [product.id, ...substituteIds] })
	const outlook = outlooks.get(product.id)
	const { supply, isOverPromised, claimants } = shareable(outlook, { lines, deliveryOn, today })
	const rows = claimants.map(({ isToShare: _, promisedCases, piecesPerCase: __, ...line }) => ({
		...line,
		sureCases: isOverPromised ? 0 : promisedCases,
	}))
	const substitutes = await findSubstitutes(tx, { producerId, substituteIds, outlooks, deliveryOn, today })
	const seen = createHash("sha256")
		.update(JSON.stringify([supply, rows]))
		.digest("base64url")
	const later = outlook ? laterSupply(outlook, promiseDay(deliveryOn, today)) : null
	return { product, deliveryOn, supply, later, isOverPromised, rows, substitutes, seen }
}

/** What of these undecided lines is to be shared, and the whole cases that can be ready for them. Reads nothing. */
export function shareable<
	L extends { isToShare: boolean; promisedCases: number; askedCases: number; piecesPerCase: number },
>(
	outlook: ProductOutlook | undefined,
	query: { lines: readonly L[]; deliveryOn: Day; today: Day },
): { supply: number; isOverPromised: boolean; claimants: L[] } {
	if (!outlook) return { supply: 0, isOverPromised: false, claimants: query.lines.filter((line) => line.isToShare) }
	const on = promiseDay(query.deliveryOn, query.today)
	const isOverPromised = (unkeptPromises(outlook).get(on) ?? 0) > 0
	const claimants = query.lines.filter((line) => isOverPromised || line.isToShare)
	const setAside = isOverPromised
		? claimants.map((line) => (line.isToShare ? line.promisedCases : line.askedCases) * line.piecesPerCase)
		: []
	const own = setAside.map((pieces) => ({ on, quantity: -pieces }))
	const [free] = freeToPromise({ ...outlook, promises: [...outlook.promises, ...own], days: [on] })
	return { supply: Math.max(0, wholeCases(free?.free ?? 0, outlook.piecesPerCase)), isOverPromised, claimants }
}

function laterSupply(outlook: ProductOutlook, on: Day): SharingFacts["later"] {
	const next = caseStrips(outlook, [on])[0]?.next
	return next ? { cases: next.quantity, on: next.on } : null
}

/** The claims of these rows, for the cases that are not sure already. A least that what is sure covers is none. */
export function claimsOf(rows: readonly SharingRow[]): Claim[] {
	return rows.map((row) => ({
		id: row.lineId,
		claimClass: row.claimClass,
		asked: row.askedCases - row.sureCases,
		least: Math.max(0, row.leastCases - row.sureCases),
		weight: row.weightPercent / 100,
		lastPart: row.last && row.last.given / row.last.asked,
		placed: row.orderNumber,
	}))
}

async function findLines(tx: Tx, query: { producerId: string; productId: string; deliveryOn: Day }): Promise<Line[]> {
	const { rows } = await tx.execute<
		Omit<Line, "last"> & { lastAsked: number | null; lastGiven: number | null; lastOn: Day | null }
	>(sql`
		select l.id as "lineId", o.id as "orderId", o.number as "orderNumber", s.id as "storeId", s.name as "storeName",
			l.asked_cases as "askedCases", l.promised_cases as "promisedCases", l.least_cases as "leastCases",
			l.is_to_share as "isToShare", l.pieces_per_case as "piecesPerCase",
			case when so.is_commitment then 'commitment' when so.id is not null then 'standing' else 'single' end as "claimClass",
			s.sharing_weight_percent as "weightPercent", last.asked_cases as "lastAsked", last.given_cases as "lastGiven",
			last.delivery_on::text as "lastOn",
			array(select sub from unnest(l.substitute_ids) with ordinality as wanted(sub, place)
				where not exists (select from order_lines had
					where had.producer_id = l.producer_id and had.order_id = l.order_id and had.product_id = sub)
				order by place)::text[] as "substituteIds"
		from orders o
		join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
		join stores s on s.producer_id = o.producer_id and s.id = o.store_id
		left join standing_orders so on so.producer_id = o.producer_id and so.id = o.standing_order_id
		left join lateral (
			select share.asked_cases, share.given_cases, r.delivery_on
			from sharing_shares share
			join sharing_runs r on r.producer_id = share.producer_id and r.id = share.run_id
			where share.producer_id = s.producer_id and share.store_id = s.id and r.product_id = l.product_id
				and r.state = 'told'
			order by r.shared_at desc, r.id limit 1
		) last on true
		where o.producer_id = ${query.producerId} and o.state = 'placed' and o.delivery_on = ${query.deliveryOn}
			and l.product_id = ${query.productId} and l.given_cases is null
		order by o.number`)
	return rows.map(({ lastAsked, lastGiven, lastOn, ...line }) => ({
		...line,
		last:
			lastAsked === null || lastGiven === null || lastOn === null
				? null
				: { asked: lastAsked, given: lastGiven, on: lastOn },
	}))
}

/** Of the products that may stand in, those with whole cases free for the day. */
async function findSubstitutes(
	tx: Tx,
	query: {
		producerId: string
		substituteIds: readonly string[]
		outlooks: ReadonlyMap<string, ProductOutlook>
		deliveryOn: Day
		today: Day
	},
): Promise<Substitute[]> {
	if (query.substituteIds.length === 0) return []
	const on = promiseDay(query.deliveryOn, query.today)
	const { rows } = await tx.execute<Omit<Substitute, "overCases"> & { toShareCases: number }>(sql`
		select p.id as "productId", p.code, p.name, coalesce((
			select sum(l.asked_cases - l.promised_cases) from orders o
			join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
			where o.producer_id = p.producer_id and o.delivery_on = ${query.deliveryOn} and o.state = 'placed'
				and l.product_id = p.id and l.is_to_share and l.given_cases is null), 0)::int as "toShareCases"
		from products p
		where p.producer_id = ${query.producerId} and p.is_active and p.id = any(${sql.param([...query.substituteIds])}::uuid[])
		order by length(p.code), p.code`)
	return rows.flatMap(({ toShareCases, ...product }) => {
		const outlook = query.outlooks.get(product.productId)
		if (!outlook) return []
		const [free] = freeToPromise({ ...outlook, days: [on] })
		const overCases = wholeCases(free?.free ?? 0, outlook.piecesPerCase) - toShareCases
		return overCases > 0 ? [{ ...product, overCases }] : []
	})
}
