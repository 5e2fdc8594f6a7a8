import { and, eq } from "drizzle-orm"
import { orderProposals, outboxMails } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { changedLines, judgeLateChange, type LateLine } from "~/domain/orders/late-change"
import { confirmationKey } from "./confirm-order.server"
import { type LockedOrder, lockOrder } from "./lock-order.server"
import { applyLines, type RefusedChange } from "./propose-change-apply.server"
import { tellStoreOfChange } from "./propose-change-letters.server"
import { recordChange } from "./record-change.server"

/** What a line is to be; a price is left out for what is priced by weight, which the scale decides. */
export type AskedChange = { lineId: string; cases: number; caseCents?: number }

export type Proposing =
	| { ok: true; outcome: "asked" | "applied" }
	| { ok: false; reason: "no-such-order" | "nothing-changed" | "nothing-given" | "open-already" | "not-told" }
	| { ok: false; reason: "not-confirmed"; state: string }
	| { ok: false; reason: "change-lines"; refused: RefusedChange[] }

/**
 * Changes an order after it was confirmed and before it is packed, with a reason. Where any line gives the store less or
 * costs it more, the change is proposed and stands when the store accepts it, one open proposal an order; where it gives
 * more or costs less it is applied at once. Either way the store's people are told by letter. While the letter of the
 * confirmation has not gone it is refused (`not-told`): undoing the confirmation is the plainer way.
 */
export function proposeChange(query: {
	producer: { id: string; slug: string; timeZone: string }
	number: number
	personId: string
	reason: string
	changes: readonly AskedChange[]
}): Promise<Proposing> {
	const { producer, number, personId, reason } = query
	const producerId = producer.id
	return withProducer(producerId, async (tx) => {
		const order = await lockOrder(tx, { producerId, number })
		if (!order) return { ok: false, reason: "no-such-order" }
		if (order.state !== "confirmed") return { ok: false, reason: "not-confirmed", state: order.state }
		if (await findOpenProposal(tx, { producerId, orderId: order.id })) return { ok: false, reason: "open-already" }
		if (await waitsToTell(tx, { producerId, orderId: order.id })) return { ok: false, reason: "not-told" }

		const lines = askedLines(order, query.changes)
		const refused = lines.flatMap(({ lineId, toCases, askedCases }): RefusedChange[] =>
			toCases > askedCases ? [{ lineId, reason: "more-than-asked", mostCases: askedCases }] : [],
		)
		if (refused.length > 0) return { ok: false, reason: "change-lines", refused }
		if (lines.every((line) => line.toCases === 0)) return { ok: false, reason: "nothing-given" }
		const judged = judgeLateChange(lines)
		if (judged === "nothing") return { ok: false, reason: "nothing-changed" }

		const changed: LateLine[] = changedLines(lines).map(({ askedCases: _, ...line }) => line)
		if (judged === "applies") {
			const tooMuch = await applyLines(tx, { producer, order, lines: changed })
			if (tooMuch.length > 0) return { ok: false, reason: "change-lines", refused: tooMuch }
			const detail = { reason, lines: changed }
			const eventId = await recordChange(tx, {
				producerId,
				orderId: order.id,
				kind: "changed",
				userId: personId,
				detail,
			})
			await tellStoreOfChange(tx, { producer, order, what: "applied", key: eventId, reason, lines: changed })
			return { ok: true, outcome: "applied" }
		}
		const [made] = await tx
			.insert(orderProposals)
			.values({ producerId, orderId: order.id, lines: changed, reason, proposedBy: personId })
			.returning({ id: orderProposals.id })
		if (!made) throw new Error("a proposal that was written has an id")
		const detail = { proposalId: made.id, reason, lines: changed }
		await recordChange(tx, { producerId, orderId: order.id, kind: "proposed", userId: personId, detail })
		await tellStoreOfChange(tx, { producer, order, what: "proposed", key: made.id, reason, lines: changed })
		return { ok: true, outcome: "asked" }
	})
}

function askedLines(order: LockedOrder, changes: readonly AskedChange[]): (LateLine & { askedCases: number })[] {
	return order.lines.map((line) => {
		const change = changes.find(({ lineId }) => lineId === line.id)
		const fromCases = line.givenCases ?? 0
		return {
			lineId: line.id,
			askedCases: line.askedCases,
			fromCases,
			toCases: change?.cases ?? fromCases,
			fromCents: line.caseCents,
			toCents: line.poundCents === null ? (change?.caseCents ?? line.caseCents) : line.caseCents,
		}
	})
}

/** The proposal that waits for the store's answer, locked; null without one. */
export async function findOpenProposal(
	tx: Tx,
	query: { producerId: string; orderId: string },
): Promise<typeof orderProposals.$inferSelect | null> {
	const [open] = await tx
		.select()
		.from(orderProposals)
		.where(
			and(
				eq(orderProposals.producerId, query.producerId),
				eq(orderProposals.orderId, query.orderId),
				eq(orderProposals.state, "open"),
			),
		)
		.for("update")
	return open ?? null
}

/** Whether the confirmation can still be undone: its letters are written and none has gone. */
async function waitsToTell(tx: Tx, query: { producerId: string; orderId: string }): Promise<boolean> {
	const letters = await tx
		.select({ sentAt: outboxMails.sentAt })
		.from(outboxMails)
		.where(and(eq(outboxMails.producerId, query.producerId), eq(outboxMails.onceKey, confirmationKey(query.orderId))))
	return letters.length > 0 && letters.every(({ sentAt }) => sentAt === null)
}
