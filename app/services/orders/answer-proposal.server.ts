import { and, eq, isNotNull, isNull } from "drizzle-orm"
import { orderProposals, outboxMails } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { now } from "~/platform/clock.server"
import { type LockedOrder, lockOrder } from "./lock-order.server"
import { applyLines, type RefusedChange } from "./propose-change-apply.server"
import { proposalKey, tellDeskOfAnswer, tellStoreOfChange } from "./propose-change-letters.server"
import { recordChange } from "./record-change.server"

export type Answering =
	| { ok: true }
	| { ok: false; reason: "no-such-order" | "no-such-proposal" }
	| { ok: false; reason: "answered-already" | "not-confirmed"; state: string }
	| { ok: false; reason: "change-lines"; refused: RefusedChange[] }

type Proposal = typeof orderProposals.$inferSelect
type Step = { producer: { id: string; slug: string; timeZone: string }; number: number; proposalId: string }

/**
 * A store's yes or no to a late change. Yes writes the lines under the locks of their products; no leaves the order as it
 * was confirmed. Never once the order is packed. Sending the same answer again is the same answer. The desk is told.
 */
export function answerProposal(
	query: Step & { storeId: string; person: { id: string; name: string }; answer: "accepted" | "declined" },
): Promise<Answering> {
	const { producer, storeId, person, answer } = query
	return settle(query, async (tx, { order, proposal }) => {
		if (order.storeId !== storeId) return { ok: false, reason: "no-such-order" }
		if (proposal.state === answer) return { ok: true }
		if (proposal.state !== "open") return { ok: false, reason: "answered-already", state: proposal.state }
		if (order.state !== "confirmed") return { ok: false, reason: "not-confirmed", state: order.state }
		if (answer === "accepted") {
			const refused = await applyLines(tx, { producer, order, lines: proposal.lines })
			if (refused.length > 0) return { ok: false, reason: "change-lines", refused }
		}
		await close(tx, { proposal, state: answer, userId: person.id })
		const { reason, lines } = proposal
		const told = { producer, order, key: proposal.id, reason, lines }
		await tellDeskOfAnswer(tx, { ...told, answer, answeredBy: person.name })
		return { ok: true }
	})
}

/** Takes a proposal back that has not been answered; a store that was told already gets a letter that says so. */
export function takeBackProposal(query: Step & { personId: string }): Promise<Answering> {
	const { producer, personId } = query
	return settle(query, async (tx, { order, proposal }) => {
		if (proposal.state === "taken-back") return { ok: true }
		if (proposal.state !== "open") return { ok: false, reason: "answered-already", state: proposal.state }
		const wasTold = await dropProposalLetters(tx, proposal)
		await close(tx, { proposal, state: "taken-back", userId: personId })
		const { reason, lines } = proposal
		if (wasTold) await tellStoreOfChange(tx, { producer, order, what: "taken-back", key: proposal.id, reason, lines })
		return { ok: true }
	})
}

async function settle(
	{ producer, number, proposalId }: Step,
	work: (tx: Tx, found: { order: LockedOrder; proposal: Proposal }) => Promise<Answering>,
): Promise<Answering> {
	const producerId = producer.id
	return withProducer(producerId, async (tx) => {
		const order = await lockOrder(tx, { producerId, number })
		if (!order) return { ok: false, reason: "no-such-order" }
		const [proposal] = await tx
			.select()
			.from(orderProposals)
			.where(
				and(
					eq(orderProposals.producerId, producerId),
					eq(orderProposals.orderId, order.id),
					eq(orderProposals.id, proposalId),
				),
			)
			.for("update")
		if (!proposal) return { ok: false, reason: "no-such-proposal" }
		return work(tx, { order, proposal })
	})
}

/** Closes a proposal and notes it on the order's timeline. */
async function close(
	tx: Tx,
	query: { proposal: Proposal; state: "accepted" | "declined" | "taken-back"; userId: string },
): Promise<void> {
	const { proposal, state, userId } = query
	const { producerId, orderId, id, reason, lines } = proposal
	await tx
		.update(orderProposals)
		.set({ state, answeredBy: userId, answeredAt: now() })
		.where(and(eq(orderProposals.producerId, producerId), eq(orderProposals.id, id)))
	const detail = { proposalId: id, answer: state, reason, lines }
	await recordChange(tx, { producerId, orderId, kind: "answered", userId, detail })
}

/** Takes the letters of a proposal out of the outbox that have not gone; answers whether any had. */
async function dropProposalLetters(tx: Tx, { producerId, id }: Proposal): Promise<boolean> {
	const isLetter = and(eq(outboxMails.producerId, producerId), eq(outboxMails.onceKey, proposalKey(id)))
	await tx.select({ id: outboxMails.id }).from(outboxMails).where(isLetter).for("update")
	await tx.delete(outboxMails).where(and(isLetter, isNull(outboxMails.sentAt)))
	const gone = await tx
		.select({ id: outboxMails.id })
		.from(outboxMails)
		.where(and(isLetter, isNotNull(outboxMails.sentAt)))
	return gone.length > 0
}
