import { type SQL, sql } from "drizzle-orm"

/**
 * The recursive part of a trace: the lot of `code` and all that came from it, as `family (lot_id)`. Each lot once, also
 * where lots were split and put together again.
 */
export function descendantsOf(producerId: string, codes: readonly string[]): SQL {
	return sql`family (lot_id) as (
		select l.id from lots l where l.producer_id = ${producerId} and l.code = any(${sql.param(codes)}::text[])
		union
		select k.to_lot_id from lot_links k join family f on k.from_lot_id = f.lot_id where k.producer_id = ${producerId}
	)`
}

/** The lots of `start (lot_id)` and all that they were made from, as `family (lot_id)`. */
export function ancestorsOf(producerId: string, start: SQL): SQL {
	return sql`family (lot_id) as (
		${start}
		union
		select k.from_lot_id from lot_links k join family f on k.to_lot_id = f.lot_id where k.producer_id = ${producerId}
	)`
}
