import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { lotCode } from "~/domain/lots/lot-code"
import { takeNumber } from "~/services/numbers/take-number.server"

/** Numbers looked at beyond those that are needed, for codes that somebody has typed by hand. */
const SPARE = 100

/** What each new lot's code is made of. `code` is one that was typed, or null for one by the producer's pattern. */
export type LotToName = { productCode: string; code: string | null }

type ToName = { producerId: string; harvestedOn: Day; lots: readonly LotToName[] }

/**
 * The codes of new lots, in the order given: those typed, and for the others the next free numbers of the year by the
 * producer's pattern. Takes the counter's lock, so take it late. When a typed code is another lot's already, answers it as
 * `taken`.
 */
export async function takeLotCodes(tx: Tx, query: ToName): Promise<{ codes: string[] } | { taken: string }> {
	const { producerId, harvestedOn } = query
	const year = Number(harvestedOn.slice(0, 4))
	const first = await takeNumber(tx, { producerId, series: "lot", year })
	const named = await nameFrom(tx, { ...query, first })
	if ("taken" in named) return named
	await tx.execute(sql`
		update counters set last = ${named.last} where producer_id = ${producerId} and series = 'lot' and year = ${year}`)
	return named
}

/** The codes that new lots would get now, without taking any number; for those typed, what was typed. */
export async function proposeLotCodes(tx: Tx, query: ToName): Promise<string[]> {
	const { producerId, harvestedOn, lots } = query
	const { rows } = await tx.execute<{ last: number }>(sql`
		select last from counters
		where producer_id = ${producerId} and series = 'lot' and year = ${Number(harvestedOn.slice(0, 4))}`)
	const named = await nameFrom(tx, { ...query, first: (rows[0]?.last ?? 0) + 1 })
	return "taken" in named ? lots.map(({ code }) => code ?? "") : named.codes
}

async function nameFrom(
	tx: Tx,
	{ producerId, harvestedOn, lots, first }: ToName & { first: number },
): Promise<{ codes: string[]; last: number } | { taken: string }> {
	const pattern = await findPattern(tx, producerId)
	const numbers = Array.from({ length: lots.length + SPARE }, (_, index) => first + index)
	const codeOf = ({ productCode }: LotToName, number: number) => lotCode(pattern, { productCode, harvestedOn, number })
	const candidates = lots.flatMap((lot) => lot.code ?? numbers.map((number) => codeOf(lot, number)))
	const { rows } = await tx.execute<{ code: string }>(sql`
		select code from lots where producer_id = ${producerId} and code = any(${sql.param(candidates)}::text[])`)
	const used = new Set(rows.map(({ code }) => code))
	const typed = lots.flatMap(({ code }) => code ?? [])
	const taken = typed.find((code) => used.has(code))
	if (taken !== undefined) return { taken }
	for (const code of typed) used.add(code)

	const free = numbers.values()
	let last = first - 1
	const codes = lots.map((lot) => {
		if (lot.code !== null) return lot.code
		for (const number of free) {
			last = number
			if (!used.has(codeOf(lot, number))) return codeOf(lot, number)
		}
		throw new Error(`no free lot code by ${pattern} from ${first}`)
	})
	return { codes, last }
}

async function findPattern(tx: Tx, producerId: string): Promise<string> {
	const { rows } = await tx.execute<{ pattern: string }>(
		sql`select lot_code_pattern as pattern from producer_settings where producer_id = ${producerId}`,
	)
	return rows[0]?.pattern ?? "{product}{yy}-{nnn}"
}
