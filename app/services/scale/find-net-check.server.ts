import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { NetContentsInput, NetContentsWorksheet } from "~/domain/scale/net-contents"
import { readWeighedLot, type WeighedLot } from "./find-scale-page.server"

export type NetCheck = {
	checkedOn: Day
	input: NetContentsInput
	worksheet: NetContentsWorksheet
	note: string
	who: string | null
}

const uuid = /^[0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12}$/

/** One check of a lot as it was made; null when the lot has none of that id. */
export async function findNetCheck(query: {
	producerId: string
	code: string
	checkId: string
}): Promise<{ lot: WeighedLot; check: NetCheck } | null> {
	const { producerId, code, checkId } = query
	if (!uuid.test(checkId)) return null
	return readProducer(producerId, async (tx) => {
		const lot = await readWeighedLot(tx, { producerId, code })
		if (!lot) return null
		const {
			rows: [check],
		} = await tx.execute<NetCheck>(sql`
			select c.checked_on::text as "checkedOn", c.input, c.worksheet, c.note, u.name as who
			from net_checks c left join users u on u.id = c.checked_by
			where c.producer_id = ${producerId} and c.lot_id = ${lot.id} and c.id = ${checkId}::uuid`)
		return check ? { lot, check } : null
	})
}
