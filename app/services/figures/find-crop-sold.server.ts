import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { CropPieces } from "~/domain/figures/shares"
import type { SalesQuery } from "./find-sales.server"

export type SoldCrop = CropPieces & { code: string; name: string; detail: string }

/**
 * Where the crop of a season is by now: the pieces of all lots harvested in the period by place, by product. Pieces that
 * were moved to another lot are counted there.
 */
export async function findCropSold(tx: Tx, { producerId, from, to }: SalesQuery): Promise<SoldCrop[]> {
	const { rows } = await tx.execute<SoldCrop>(sql`
		select p.code, p.name, p.detail,
			coalesce(sum(b.pieces) filter (where b.place = 'sold'), 0)::int as "soldPieces",
			coalesce(sum(b.pieces) filter (where b.place in ('cold-room', 'ready', 'packed', 'van', 'market')), 0)::int as "stockPieces",
			coalesce(sum(b.pieces) filter (where b.place = 'waste'), 0)::int as "wastePieces",
			coalesce(sum(b.pieces) filter (where b.place = 'missing'), 0)::int as "missingPieces",
			coalesce(sum(b.pieces) filter (where b.place = 'cut-up'), 0)::int as "cutUpPieces"
		from lots l
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id and b.place <> 'other-lot' and b.pieces > 0
		where l.producer_id = ${producerId} and l.harvested_on between ${from}::date and ${to}::date
		group by p.id, p.code, p.name, p.detail
		order by p.code`)
	return rows
}
