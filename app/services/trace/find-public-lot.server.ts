import { sql } from "drizzle-orm"
import type { products } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { LotState } from "~/services/desk/list-lots.server"

type Product = typeof products.$inferSelect

/** What anyone who holds a piece may know of its lot. Nothing here tells who bought of it. */
export type PublicLot = {
	code: string
	state: LotState
	productName: string
	detail: string
	form: Product["form"]
	colour: Product["colour"]
	grade: string
	harvestedOn: Day
	bestBeforeOn: Day
	yard: string
	flora: string
	pfundTenths: number | null
	withdrawal: { reason: string; instructions: string; startedAt: Date } | null
	contact: { address: string; email: string; phone: string }
}

/** The public facts of a lot by its code, or null when the producer has none of that code. */
export function findPublicLot(query: { producerId: string; code: string }): Promise<PublicLot | null> {
	const { producerId, code } = query
	return readProducer(producerId, async (tx) => {
		type Found = Omit<PublicLot, "withdrawal"> & {
			withdrawal: { reason: string; instructions: string; startedAt: string } | null
		}
		const { rows } = await tx.execute<Found>(sql`
			select l.code, l.state, p.name as "productName", p.detail, p.form, p.colour, l.grade,
				l.harvested_on::text as "harvestedOn", l.best_before_on::text as "bestBeforeOn", l.yard,
				coalesce(nullif(l.flora, ''), p.flora) as flora, l.pfund_tenths as "pfundTenths",
				(select json_build_object('reason', w.reason, 'instructions', w.instructions, 'startedAt', w.started_at)
					from withdrawal_lots x
					join withdrawals w on w.producer_id = x.producer_id and w.id = x.withdrawal_id
					where x.producer_id = l.producer_id and x.lot_id = l.id) as withdrawal,
				json_build_object('address', c.address, 'email', c.email, 'phone', c.phone) as contact
			from lots l
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			join producer_settings c on c.producer_id = l.producer_id
			where l.producer_id = ${producerId} and l.code = ${code}`)
		const [lot] = rows
		if (!lot) return null
		const { withdrawal } = lot
		return { ...lot, withdrawal: withdrawal && { ...withdrawal, startedAt: new Date(withdrawal.startedAt) } }
	})
}
