import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { labelOrder } from "./find-board.server"

type YardInUse = { id: string; name: string; flora: string; hives: number; supersOn: number }

/** The producer's yards in use with what stands in them, by name. */
export function listYards(producerId: string): Promise<YardInUse[]> {
	return readProducer(producerId, (tx) => readYards(tx, producerId))
}

async function readYards(tx: Tx, producerId: string): Promise<YardInUse[]> {
	const { rows } = await tx.execute<YardInUse>(sql`
		select y.id, y.name, y.flora, count(distinct h.id)::int as hives, count(s.id)::int as "supersOn"
		from yards y
		left join hives h on h.producer_id = y.producer_id and h.yard_id = y.id and h.is_active
		left join supers s on s.producer_id = h.producer_id and s.hive_id = h.id and s.state <> 'off'
		where y.producer_id = ${producerId} and y.is_active
		group by y.id, y.name, y.flora
		order by y.name`)
	return rows
}

export type HiveInYard = { id: string; label: string; isActive: boolean; supersOn: number; pieces: number }

type YardSetUp = {
	yard: YardInUse
	/** All yards, to move hives to. */
	yards: YardInUse[]
	/** Every hive that stands here, those in use first. */
	hives: HiveInYard[]
	/** What supers can be built for. */
	products: { id: string; name: string; detail: string }[]
}

/** A yard with its hives, as it is set up; null when the producer has none of this id in use. */
export function findYardSetUp(query: { producerId: string; yardId: string }): Promise<YardSetUp | null> {
	const { producerId, yardId } = query
	return readProducer(producerId, async (tx) => {
		const yards = await readYards(tx, producerId)
		const yard = yards.find(({ id }) => id === yardId)
		if (!yard) return null
		const { rows: hives } = await tx.execute<HiveInYard>(sql`
			select h.id, h.label, h.is_active as "isActive", count(s.id)::int as "supersOn",
				coalesce(sum(s.capacity_pieces), 0)::int as pieces
			from hives h
			left join supers s on s.producer_id = h.producer_id and s.hive_id = h.id and s.state <> 'off'
			where h.producer_id = ${producerId} and h.yard_id = ${yardId}
			group by h.id, h.label, h.is_active
			order by h.is_active desc, ${labelOrder(sql`h.label`)}`)
		return { yard, yards, hives, products: await readProducts(tx, producerId) }
	})
}

/** Products in use that come in supers, by their number in the price list. */
export function listSuperProducts(producerId: string): Promise<YardSetUp["products"]> {
	return readProducer(producerId, (tx) => readProducts(tx, producerId))
}

async function readProducts(tx: Tx, producerId: string): Promise<YardSetUp["products"]> {
	const { rows } = await tx.execute<YardSetUp["products"][number]>(sql`
		select id, name, detail from products where producer_id = ${producerId} and is_active order by code`)
	return rows
}
