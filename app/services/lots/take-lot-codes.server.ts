import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { lotCode } from "~/domain/lots/lot-code"
import { takeNumber } from "~/services/numbers/take-number.server"

/** Numbers looked at beyond those that are needed, for codes that somebody has typed by hand. */
const SPARE = 100

/** What each new lot's code is made of. `code` is one that was typed, or null for one by the producer's pattern. */
export type LotToName = { productCode: string; code: string | null }

/**
 * The codes of new lots, in the order given: those typed, and for the others the next free numbers of the year by the
 * producer's pattern. Takes the counter's lock, so take it late. Null when a typed code is another lot's already, with
 * that code.
 */
export async function takeLotCodes(
	tx: Tx,
	query: { producerId: string; harvestedOn: Day; lots: readonly LotToName[] },
): Promise<{ codes: string[] } | { taken: string }> {
	const { producerId, harvestedOn, lots } = query
	const pattern = await findPattern(tx, producerId)
	const year = Number(harvestedOn.slice(0, 4))
	const first = await takeNumber(tx, { producerId, series: "lot", year })
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
	await tx.execute(sql`
		update counters set last = ${last} where producer_id = ${producerId} and series = 'lot' and year = ${year}`)
	return { codes }
}

async function findPattern(tx: Tx, producerId: string): Promise<string> {
	const { rows } = await tx.execute<{ pattern: string }>(
		sql`select lot_code_pattern as pattern from producer_settings where producer_id = ${producerId}`,
	)
	return rows[0]?.pattern ?? "{product}{yy}-{nnn}"
}
