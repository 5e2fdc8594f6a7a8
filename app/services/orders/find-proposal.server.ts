import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { LateLine } from "~/domain/orders/late-change"

/** A line of a confirmed order that a late change may touch. */
export type ChangeableLine = {
	lineId: string
	code: string
	name: string
	askedCases: number
	givenCases: number
	caseCents: number
	/** Priced by weight: what a case costs is an estimate that the scale replaces. */
	isWeighed: boolean
}

/** A proposal that waits for the store's answer. */
export type OpenProposal = {
	id: string
	reason: string
	who: string
	at: Date
	lines: (LateLine & { name: string })[]
}

/** What a late change to an order could touch, and the one that waits for an answer, if any. Two statements. */
export function findProposal(query: {
	producerId: string
	number: number
}): Promise<{ open: OpenProposal | null; lines: ChangeableLine[] }> {
	const { producerId, number } = query
	return readProducer(producerId, async (tx) => {
		const { rows: lines } = await tx.execute<ChangeableLine>(sql`
			select l.id as "lineId", p.code, p.name, l.asked_cases as "askedCases", coalesce(l.given_cases, 0) as "givenCases",
				l.case_cents as "caseCents", l.pound_cents is not null as "isWeighed"
			from orders o
			join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			where o.producer_id = ${producerId} and o.number = ${number}
			order by length(p.code), p.code`)
		const { rows } = await tx.execute<Omit<OpenProposal, "lines"> & { at: string; lines: LateLine[] }>(sql`
			select r.id, r.reason, u.name as who, r.proposed_at as at, r.lines
			from orders o
			join order_proposals r on r.producer_id = o.producer_id and r.order_id = o.id and r.state = 'open'
			join users u on u.id = r.proposed_by
			where o.producer_id = ${producerId} and o.number = ${number} and o.state = 'confirmed'`)
		const [open] = rows
		const nameOf = (lineId: string) => lines.find((line) => line.lineId === lineId)?.name ?? ""
		return {
			lines,
			open: open
				? {
						...open,
						at: new Date(open.at),
						lines: open.lines.map((line) => ({ ...line, name: nameOf(line.lineId) })),
					}
				: null,
		}
	})
}
