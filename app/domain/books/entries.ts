import type { BookAccountKey } from "./accounts"

/** How money came in from a store. */
export type MoneyWay = "card" | "bank-debit" | "cheque" | "cash" | "transfer"
/** How a payment went back. */
export type ReturnWay = "refund" | "bank-return" | "dispute" | "bounced"
export type ReturnState = "asked" | "done" | "failed" | "won"

/** What moves money or what is owed. Amounts are whole cents. */
export type BookEvent =
	| { kind: "invoice"; of: "goods" | "finance-charge"; linesCents: number; deliveryCents: number; taxCents: number }
	| { kind: "credit"; linesCents: number; taxCents: number }
	/** Money that is here; a bank debit once it has cleared. */
	| { kind: "payment"; method: MoneyWay; amountCents: number }
	/** Below zero where it is taken back. */
	| { kind: "discount"; amountCents: number }
	| { kind: "write-off"; amountCents: number }
	/** A payment that goes back moves from one state to the next; `from` is null at first. */
	| {
			kind: "return"
			way: ReturnWay
			method: MoneyWay
			from: ReturnState | null
			to: ReturnState
			amountCents: number
	  }
	/** What Stripe paid out: `grossCents` less the fees it kept. */
	| { kind: "payout"; grossCents: number; feeCents: number }
	/** The stall's paid sales of one way to pay; `taxCents` is the part of the total that is sales tax. */
	| { kind: "stall-sales"; method: "card" | "cash"; totalCents: number; taxCents: number }

/** One line of an entry: an account with a debit or a credit above zero, never both. */
export type BookLine = { account: BookAccountKey; debitCents: number; creditCents: number }

/** So much to an account: debit above zero, credit below. */
type Posting = readonly [account: BookAccountKey, debitCents: number]

/**
 * The lines of an event; their debits equal their credits, and none is of nothing. No lines where nothing moves.
 * What each event does, by the rules of double entry as textbooks teach them (a debit adds to what is owned and to costs,
 * a credit to what is owed and to income; from memory):
 *
 * - Invoice: the store owes the whole; goods, delivery and a charge for paying late are income, tax is owed to the state.
 * - Credit: the mirror image; the goods go to an account of their own, so that sales stay as they were invoiced.
 * - Payment: takes from what stores owe, whether it settles an invoice or waits on account: so what a store has on account
 *   is a credit on the same account. Cards and debits lie with Stripe until they are paid out; checks and transfers are at
 *   the bank on the day they come. A bank debit on its way has no entry: nothing is here, and the debt stands until it
 *   clears.
 * - Discount for paying early, and bad debt: a cost against what stores owe. Whether tax may be taken back with either is
 *   for local rules to decide: the tax stays as invoiced here, and the bookkeeper corrects it.
 * - Payment that goes back: the store owes it again. A dispute holds the money on an account of its own while it is open;
 *   a dispute that was won and a refund that failed give it back.
 * - Payout: to the bank what arrived, to the fees what Stripe kept. The fees are entered here, as they are sure only now.
 * - Stall sales: the price on the sign contains the tax, which is taken out of the sales.
 *
 * Throws RangeError on parts of a cent, and on amounts below zero other than of a discount or bad debt taken back, and
 * of a payout that the bank was charged for.
 */
export function entriesOf(event: BookEvent): BookLine[] {
	requireWhole(event)
	return linesOf(postingsOf(event))
}

function postingsOf(event: BookEvent): Posting[] {
	switch (event.kind) {
		case "invoice": {
			const { linesCents, deliveryCents, taxCents } = event
			return [
				["receivable", linesCents + deliveryCents + taxCents],
				[event.of === "goods" ? "sales" : "finance-charges", -linesCents],
				["delivery-income", -deliveryCents],
				["sales-tax", -taxCents],
			]
		}
		case "credit":
			return [
				["credits-given", event.linesCents],
				["sales-tax", event.taxCents],
				["receivable", -(event.linesCents + event.taxCents)],
			]
		case "payment":
			return between(placeOf(event.method), "receivable", event.amountCents)
		case "discount":
			return between("discount-given", "receivable", event.amountCents)
		case "write-off":
			return between("bad-debt", "receivable", event.amountCents)
		case "return":
			return [...standing(event, event.to), ...standing(event, event.from).map(turned)]
		case "payout":
			return [
				["bank", event.grossCents - event.feeCents],
				["card-fees", event.feeCents],
				["stripe", -event.grossCents],
			]
		case "stall-sales":
			return [
				[event.method === "card" ? "stripe" : "cash", event.totalCents],
				["sales", event.taxCents - event.totalCents],
				["sales-tax", -event.taxCents],
			]
	}
}

/** What stands in the books while a payment that went back is in a state. */
function standing(event: BookEvent & { kind: "return" }, state: ReturnState | null): Posting[] {
	const place = placeOf(event.method)
	if (state === "done") return between("receivable", place, event.amountCents)
	if (state === "asked" && event.way === "dispute") return between("disputes", place, event.amountCents)
	return []
}

function between(debit: BookAccountKey, credit: BookAccountKey, cents: number): Posting[] {
	return [
		[debit, cents],
		[credit, -cents],
	]
}

const turned = ([account, cents]: Posting): Posting => [account, -cents]

/** Where money of this way lies when it has come in. */
function placeOf(method: MoneyWay): BookAccountKey {
	if (method === "card" || method === "bank-debit") return "stripe"
	return method === "cash" ? "cash" : "bank"
}

/** One line for each account that something is left on, debits first. */
function linesOf(postings: readonly Posting[]): BookLine[] {
	const sums = new Map<BookAccountKey, number>()
	for (const [account, cents] of postings) sums.set(account, (sums.get(account) ?? 0) + cents)
	return [...sums]
		.filter(([, cents]) => cents !== 0)
		.toSorted(([, a], [, b]) => Math.sign(b) - Math.sign(a))
		.map(([account, cents]) => ({ account, debitCents: Math.max(cents, 0), creditCents: Math.max(-cents, 0) }))
}

/** The kinds whose amounts may be below zero. */
const TURNABLE: readonly BookEvent["kind"][] = ["discount", "write-off", "payout"]

function requireWhole(event: BookEvent): void {
	for (const value of Object.values(event)) {
		if (typeof value !== "number") continue
		if (!Number.isSafeInteger(value) || (value < 0 && !TURNABLE.includes(event.kind)))
			throw new RangeError(`not whole cents: ${value}`)
	}
	if (event.kind === "stall-sales" && event.taxCents > event.totalCents)
		throw new RangeError(`more tax than was paid: ${event.taxCents}`)
}
