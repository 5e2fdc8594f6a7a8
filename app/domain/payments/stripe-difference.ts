import { formatMoney } from "~/domain/money"

type Status = "paid" | "on-its-way" | "not-paid"

/** A payment as it stands here. `returnedCents` is null where refunds are not kept here. */
export type OurPayment = { intentId: string; status: Status; amountCents: number; returnedCents: number | null }

/** The same as Stripe has it. */
export type TheirPayment = { status: Status; amountCents: number; returnedCents: number }

export type DifferenceKind = "missing-here" | "missing-there" | "other-amount" | "other-state"

export type Difference = {
	kind: DifferenceKind
	stripeId: string
	ourCents: number | null
	theirCents: number | null
	detail: string
}

const STATUS_WORDS: Record<Status, string> = { paid: "paid", "on-its-way": "on its way", "not-paid": "not paid" }

/**
 * Where a payment stands otherwise here than at Stripe, in words; null where the two agree. What nobody has paid is missed
 * by nobody.
 */
export function differenceOf(
	intentId: string,
	ours: OurPayment | null,
	theirs: TheirPayment | null,
): Difference | null {
	const about = { stripeId: intentId, ourCents: ours?.amountCents ?? null, theirCents: theirs?.amountCents ?? null }
	if (!theirs) {
		if (!ours) return null
		return { kind: "missing-there", ...about, detail: "Stripe knows no such payment." }
	}
	if (!ours) {
		if (theirs.status === "not-paid") return null
		return { kind: "missing-here", ...about, detail: `At Stripe it is ${STATUS_WORDS[theirs.status]}.` }
	}
	if (ours.status !== theirs.status) {
		const detail = `Here it is ${STATUS_WORDS[ours.status]}, at Stripe ${STATUS_WORDS[theirs.status]}.`
		return { kind: "other-state", ...about, detail }
	}
	if (theirs.status === "not-paid") return null
	if (ours.amountCents !== theirs.amountCents) {
		return { kind: "other-amount", ...about, detail: "The two amounts differ." }
	}
	if (ours.returnedCents === null || ours.returnedCents === theirs.returnedCents) return null
	return {
		kind: "other-amount",
		stripeId: intentId,
		ourCents: ours.returnedCents,
		theirCents: theirs.returnedCents,
		detail: `Refunded here: ${formatMoney(ours.returnedCents)}. At Stripe: ${formatMoney(theirs.returnedCents)}.`,
	}
}

const KIND_WORDS: Record<DifferenceKind, string> = {
	"missing-here": "Paid there, unknown here",
	"missing-there": "Noted here, unknown there",
	"other-amount": "Another amount",
	"other-state": "Stands otherwise",
}

/** "Paid there, unknown here". */
export function differenceWords(kind: DifferenceKind): string {
	return KIND_WORDS[kind]
}
