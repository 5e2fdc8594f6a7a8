import fc from "fast-check"
import { afterAll, expect, test } from "vitest"
import { applyStripeEvent } from "~/services/payments/apply-stripe-event.server"
import { reconcileStripe } from "~/services/payments/reconcile-stripe.server"
import { openStore, openYard, type Shop, type Yard } from "../orders/place-yard"
import {
	addInvoice,
	bankSays,
	debit,
	EMPTY_ACCOUNT,
	GOOD_ACCOUNT,
	GOOD_CARD,
	readAccount,
	startPayingParts,
	startPaymentService,
	typeCard,
} from "./paying"

const service = await startPaymentService()
afterAll(service.close)

/** What payers and their banks do, one after the other; parts of the invoices are in hundredths of what they came to. */
type Deed =
	| { do: "card"; shares: [number, number] }
	| { do: "debit"; shares: [number, number]; holds: boolean }
	| { do: "bank answers"; which: number }
	| { do: "refund"; which: number; share: number }
	| { do: "refund fails"; which: number }
	| { do: "dispute"; which: number }
	| { do: "decide"; which: number; won: boolean }
	/** Events that came so far are applied now, in an order of their own, some of them twice. */
	| { do: "apply"; order: number; twice: boolean }
	/** The events of the next deed are lost. */
	| { do: "lose" }

const TOTALS: [number, number] = [10_000, 7_500]
const which = fc.nat({ max: 5 })
const shares = fc.tuple(fc.constantFrom(0, 30, 50, 100), fc.constantFrom(0, 40, 100))
const deed: fc.Arbitrary<Deed> = fc.oneof(
	fc.record({ do: fc.constant("card" as const), shares }),
	fc.record({ do: fc.constant("debit" as const), shares, holds: fc.boolean() }),
	fc.record({ do: fc.constant("bank answers" as const), which }),
	fc.record({ do: fc.constant("refund" as const), which, share: fc.constantFrom(20, 100) }),
	fc.record({ do: fc.constant("refund fails" as const), which }),
	fc.record({ do: fc.constant("dispute" as const), which }),
	fc.record({ do: fc.constant("decide" as const), which, won: fc.boolean() }),
	fc.record({ do: fc.constant("apply" as const), order: fc.nat(), twice: fc.boolean() }),
	fc.record({ do: fc.constant("lose" as const) }),
)

/** A list in an order that the number decides. */
function shuffled<T>(list: readonly T[], order: number): T[] {
	let seed = order || 1
	const rest = [...list]
	return list.map(() => {
		seed = (seed * 48_271) % 2_147_483_647
		return rest.splice(seed % rest.length, 1)[0] as T
	})
}

const pick = <T>(rows: Iterable<T>, index: number, wanted: (row: T) => boolean): T | undefined => {
	const fit = [...rows].filter(wanted)
	return fit.length === 0 ? undefined : fit[index % fit.length]
}

async function pay(yard: Yard, shop: Shop, numbers: string[], one: Extract<Deed, { shares: [number, number] }>) {
	const wishes = numbers.flatMap((number, index) => {
		const cents = ((TOTALS[index] ?? 0) * (one.shares[index] ?? 0)) / 100
		return cents > 0 ? [{ number, cents }] : []
	})
	if (wishes.length === 0) return
	if (one.do === "debit") {
		const account = one.holds ? GOOD_ACCOUNT : EMPTY_ACCOUNT
		await debit(service, yard, shop, { wishes, account }).catch(() => undefined)
		return
	}
	const started = await startPayingParts(yard, shop, wishes)
	if (started.ok) await typeCard(started.url, GOOD_CARD)
}

/** Does one deed at the fake; those that find nothing to be done to do nothing. */
async function act(yard: Yard, shop: Shop, numbers: string[], one: Deed): Promise<void> {
	const { intents, charges, refunds, disputes } = service.fake.state
	switch (one.do) {
		case "card":
		case "debit":
			return pay(yard, shop, numbers, one)
		case "bank answers": {
			const intent = pick(intents.values(), one.which, ({ status }) => status === "processing")
			if (intent) bankSays(service, { step: "settle-debit", intent: intent.id })
			return
		}
		case "refund": {
			const charge = pick(
				charges.values(),
				one.which,
				(row) => row.captured && row.status === "succeeded" && !row.disputed,
			)
			const left = charge ? charge.amount_captured - charge.amount_refunded : 0
			if (!charge || left === 0) return
			const amount = Math.max(1, Math.floor((left * one.share) / 100))
			// Somebody gives it back on Stripe's own pages: nothing is known of it here before the event.
			const body = new URLSearchParams({ charge: charge.id, amount: String(amount) })
			const headers = { Authorization: "Bearer sk_test_by_hand" }
			await (await fetch(`${service.fake.url}/v1/refunds`, { method: "POST", body, headers })).text()
			return
		}
		case "refund fails": {
			const refund = pick(refunds.values(), one.which, ({ status }) => status !== "failed")
			if (refund) bankSays(service, { step: "settle-refund", refund: refund.id, outcome: "failed" })
			return
		}
		case "dispute": {
			const isFree = (id: string) => ![...refunds.values()].some((refund) => refund.charge === id)
			const charge = pick(
				charges.values(),
				one.which,
				(row) => row.status === "succeeded" && !row.disputed && isFree(row.id),
			)
			if (charge) bankSays(service, { step: "open-dispute", charge: charge.id })
			return
		}
		case "decide": {
			const dispute = pick(disputes.values(), one.which, ({ status }) => status === "needs_response")
			if (dispute) bankSays(service, { step: "close-dispute", dispute: dispute.id, outcome: one.won ? "won" : "lost" })
			return
		}
		case "apply": {
			await service.fake.idle()
			const ids = service.taken.splice(0)
			for (const eventId of shuffled(one.twice ? [...ids, ...ids] : ids, one.order)) await applyStripeEvent({ eventId })
			return
		}
		case "lose":
			service.fake.switch({ muteEvents: true })
	}
}

/**
 * What must come out the same: what is open of each invoice, each payment with what went back of it, and the sum on
 * account. Which of two payments of one invoice settles it, and which waits on account, may depend on which came first.
 */
async function outcome(yard: Yard) {
	const account = await readAccount(yard)
	const settledIn = account.payments.map((words) => Number(/settled (\d+) returned/.exec(words)?.[1] ?? 0))
	return {
		open: account.open,
		payments: account.payments.map((words) => words.replace(/ settled \d+ returned/, " returned")),
		settledCents: settledIn.reduce((sum, cents) => sum + cents, 0),
		onAccountCents: account.onAccountCents,
		returns: account.returns,
	}
}

test("whatever order, repetition or loss the events of a store's payments meet, the account ends as Stripe has it", async () => {
	await fc.assert(
		fc.asyncProperty(fc.array(deed, { minLength: 3, maxLength: 12 }), async (deeds) => {
			service.fake.reset()
			service.taken.length = 0
			const yard = await openYard()
			const shop = await openStore(yard)
			const numbers = [
				await addInvoice(yard, shop, { sequence: 1, totalCents: TOTALS[0], dueOn: "2026-08-20" }),
				await addInvoice(yard, shop, { sequence: 2, totalCents: TOTALS[1], dueOn: "2026-08-27" }),
			]
			for (const one of deeds) {
				await act(yard, shop, numbers, one)
				if (one.do !== "lose") service.fake.switch({ muteEvents: false })
			}
			service.fake.switch({ muteEvents: false })
			// The night: what was lost is found, and the rest of what came is applied the other way round.
			await reconcileStripe()
			await service.fake.idle()
			for (const eventId of service.taken.splice(0).reverse()) await applyStripeEvent({ eventId })
			const ended = await outcome(yard)

			const paid = [...service.fake.state.intents.values()].filter(({ status }) => status === "succeeded")
			const paidCents = paid.reduce((sum, intent) => sum + intent.amount_received, 0)
			const refunded = [...service.fake.state.refunds.values()].filter(({ status }) => status === "succeeded")
			const disputed = [...service.fake.state.disputes.values()].filter(({ status }) => status !== "won")
			const goneCents = [...refunded, ...disputed].reduce((sum, one) => sum + one.amount, 0)
			expect(ended.settledCents + ended.onAccountCents).toBe(paidCents - goneCents)
			expect(TOTALS[0] + TOTALS[1] - (ended.open[0] ?? 0) - (ended.open[1] ?? 0)).toBe(ended.settledCents)

			// Sent again, all of it, in any order, and the night once more: nothing moves.
			const all = [...service.fake.state.events.keys()]
			for (const eventId of shuffled(all, deeds.length)) await applyStripeEvent({ eventId })
			await reconcileStripe()
			expect(await outcome(yard)).toEqual(ended)
		}),
		{ numRuns: Number(process.env.EVENT_RUNS ?? 12) },
	)
}, 240_000)

test("the same deeds end the same when events are applied one by one, all at once, backwards, or are lost", async () => {
	const end = async (manner: "one-by-one" | "at-once" | "backwards" | "lost") => {
		service.fake.reset()
		service.taken.length = 0
		const yard = await openYard()
		const shop = await openStore(yard)
		const numbers = [
			await addInvoice(yard, shop, { sequence: 1, totalCents: TOTALS[0], dueOn: "2026-08-20" }),
			await addInvoice(yard, shop, { sequence: 2, totalCents: TOTALS[1], dueOn: "2026-08-27" }),
		]
		const apply = async (order: (ids: string[]) => string[]) => {
			await service.fake.idle()
			for (const eventId of order(service.taken.splice(0))) await applyStripeEvent({ eventId })
		}
		if (manner === "lost") service.fake.switch({ muteEvents: true })
		// Each invoice is paid once: whoever pays one whose payment is not known here yet is told to wait.
		const deeds: Deed[] = [
			{ do: "card", shares: [100, 0] },
			{ do: "debit", shares: [0, 100], holds: true },
			{ do: "bank answers", which: 0 },
			{ do: "refund", which: 0, share: 20 },
			{ do: "refund", which: 0, share: 100 },
			{ do: "refund fails", which: 0 },
			{ do: "dispute", which: 0 },
		]
		for (const one of deeds) {
			await act(yard, shop, numbers, one)
			if (manner === "one-by-one") await apply((ids) => ids)
		}
		if (manner === "at-once") {
			await service.fake.idle()
			await Promise.all(service.taken.splice(0).map((eventId) => applyStripeEvent({ eventId })))
		}
		await apply((ids) => ids.reverse())
		if (manner === "lost") await reconcileStripe()
		return outcome(yard)
	}
	const first = await end("one-by-one")
	expect(first.payments.length).toBeGreaterThan(1)
	expect(first.returns.length).toBeGreaterThan(1)
	for (const manner of ["at-once", "backwards", "lost"] as const) expect(await end(manner), manner).toEqual(first)
}, 60_000)
