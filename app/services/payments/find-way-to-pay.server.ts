import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"

/** The way to pay that a store keeps: its words, and who agreed when that what falls due is taken by itself. */
export type KeptWay = {
	keptWords: string
	isAutomatic: boolean
	agreedBy: string | null
	agreedAt: Date | null
}

/** What the store keeps to pay with; `keptWords` is empty where it keeps nothing. */
export function findWayToPay(query: { producerId: string; storeId: string }): Promise<KeptWay> {
	return readProducer(query.producerId, async (tx) => {
		const { rows } = await tx.execute<Omit<KeptWay, "agreedAt"> & { agreedAt: string | null }>(sql`
			select s.pays_with_words as "keptWords", s.pays_automatically as "isAutomatic", u.name as "agreedBy",
				s.autopay_agreed_at::text as "agreedAt"
			from stores s left join users u on u.id = s.autopay_agreed_by
			where s.producer_id = ${query.producerId} and s.id = ${query.storeId}`)
		const row = rows[0]
		if (!row) return { keptWords: "", isAutomatic: false, agreedBy: null, agreedAt: null }
		return { ...row, agreedAt: row.agreedAt ? new Date(row.agreedAt) : null }
	})
}
