import { randomUUID } from "node:crypto"
import Papa from "papaparse"
import {
	creditLines,
	credits,
	invoiceLines,
	invoices,
	marketDays,
	markets,
	paymentReturns,
	payments,
	payouts,
	saleLines,
	sales,
	settlements,
} from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { listEntries } from "~/services/books/list-entries.server"
import { addHand, producerOf } from "../desk/desk-steps"
import { addProduct, openStore, openYard, type Shop, type Yard } from "../orders/place-yard"

/** A yard with one store, one product and someone at the desk, in which money can move. */
export type MoneyYard = {
	yard: Yard
	shop: Shop
	productId: string
	personId: string
	producer: { id: string; timeZone: string }
}

export async function openMoneyYard(): Promise<MoneyYard> {
	const yard = await openYard()
	const producer = producerOf(yard)
	return {
		yard,
		producer,
		shop: await openStore(yard),
		productId: await addProduct(yard, { code: "11", readyCases: 0 }),
		personId: await addHand(),
	}
}

/** Runs `work` with rows of the yard's producer in sight. */
const within = (at: MoneyYard, work: Parameters<typeof withProducer<void>>[1]) => withProducer(at.producer.id, work)

/** An invoice of goods with one line; answers its id. */
export async function issue(
	at: MoneyYard,
	invoice: { on: Day; sequence: number; linesCents: number; deliveryCents?: number; taxCents?: number },
): Promise<string> {
	const { on, sequence, linesCents, deliveryCents = 0, taxCents = 0 } = invoice
	const [producerId, id] = [at.producer.id, randomUUID()]
	await within(at, async (tx) => {
		await tx.insert(invoices).values({
			producerId,
			id,
			year: Number(on.slice(0, 4)),
			sequence,
			storeId: at.shop.storeId,
			issuedOn: on,
			dueOn: on,
			linesCents,
			deliveryCents,
			taxCents,
			totalCents: linesCents + deliveryCents + taxCents,
		})
		await tx.insert(invoiceLines).values({
			producerId,
			invoiceId: id,
			position: 1,
			productId: at.productId,
			code: "11",
			name: "Round section 11",
			detail: "",
			netGrams: 0,
			askedCases: 1,
			sentCases: 1,
			caseCents: linesCents,
			lineCents: linesCents,
			taxCents,
		})
	})
	return id
}

/** A credit with one line, on account until it is settled with an invoice; answers its id. */
export async function credit(
	at: MoneyYard,
	memo: { on: Day; sequence: number; linesCents: number; reason: string; invoiceId?: string },
): Promise<string> {
	const { on, sequence, linesCents, reason, invoiceId } = memo
	const [producerId, id] = [at.producer.id, randomUUID()]
	await within(at, async (tx) => {
		const amounts = { linesCents, taxCents: 0, totalCents: linesCents }
		await tx.insert(credits).values({
			producerId,
			id,
			year: Number(on.slice(0, 4)),
			sequence,
			storeId: at.shop.storeId,
			invoiceId: invoiceId ?? null,
			issuedOn: on,
			kind: "breakage",
			reason,
			...amounts,
			issuedBy: at.personId,
		})
		await tx.insert(creditLines).values({ producerId, creditId: id, position: 1, name: "Round", lineCents: linesCents })
		if (invoiceId)
			await tx
				.insert(settlements)
				.values({ producerId, invoiceId, kind: "credit", creditId: id, amountCents: linesCents, settledOn: on })
	})
	return id
}

export type Paid = {
	on: Day
	cents: number
	method?: "card" | "bank-debit" | "cheque" | "cash" | "transfer"
	state?: "on-its-way" | "settled"
	reference?: string
	invoiceId?: string
	discountCents?: number
	stripePayoutId?: string
	feeCents?: number
}

/** A payment, and what it settles of one invoice with the discount that goes with it; answers its id. */
export async function pay(at: MoneyYard, paid: Paid): Promise<string> {
	const { on, cents, method = "cheque", state = "settled", reference = "", invoiceId, discountCents = 0 } = paid
	const { stripePayoutId = null, feeCents = null } = paid
	const [producerId, id] = [at.producer.id, randomUUID()]
	await within(at, async (tx) => {
		await tx.insert(payments).values({
			producerId,
			id,
			storeId: at.shop.storeId,
			method,
			state,
			amountCents: cents,
			receivedOn: on,
			reference,
			feeCents,
			stripePayoutId,
			stripePaymentIntentId: method === "card" || method === "bank-debit" ? `pi_${id}` : null,
		})
		if (!invoiceId) return
		const part = { producerId, invoiceId, paymentId: id, settledOn: on }
		await tx.insert(settlements).values({ ...part, kind: "payment", amountCents: cents })
		if (discountCents > 0)
			await tx.insert(settlements).values({ ...part, kind: "discount", amountCents: discountCents })
	})
	return id
}

export async function giveUp(at: MoneyYard, lost: { on: Day; invoiceId: string; cents: number }): Promise<void> {
	const { on, invoiceId, cents } = lost
	await within(at, async (tx) => {
		await tx
			.insert(settlements)
			.values({ producerId: at.producer.id, invoiceId, kind: "write-off", amountCents: cents, settledOn: on })
	})
}

/** What of a payment goes back; answers its id. */
export async function sendBack(
	at: MoneyYard,
	back: {
		on: Day
		paymentId: string
		cents: number
		kind?: "refund" | "dispute" | "bank-return" | "bounced"
		state?: "asked" | "done"
	},
): Promise<string> {
	const { on, paymentId, cents, kind = "refund", state = "done" } = back
	const id = randomUUID()
	await within(at, async (tx) => {
		await tx.insert(paymentReturns).values({
			producerId: at.producer.id,
			id,
			paymentId,
			kind,
			state,
			amountCents: cents,
			returnedOn: on,
			stripeId: `re_${id}`,
		})
	})
	return id
}

export async function payOut(
	at: MoneyYard,
	payout: { on: Day; name: string; grossCents: number; feeCents: number },
): Promise<void> {
	const { on, name, grossCents, feeCents } = payout
	await within(at, async (tx) => {
		await tx.insert(payouts).values({
			producerId: at.producer.id,
			stripePayoutId: name,
			arrivedOn: on,
			grossCents,
			feeCents,
			netCents: grossCents - feeCents,
		})
	})
}

/** Sales of the stall on one day, a piece each. */
export async function sellAtStall(
	at: MoneyYard,
	stall: { on: Day; market: string; cash?: number[]; card?: number[] },
): Promise<void> {
	const producerId = at.producer.id
	const [marketId, marketDayId] = [randomUUID(), randomUUID()]
	await within(at, async (tx) => {
		await tx
			.insert(markets)
			.values({ producerId, id: marketId, name: stall.market, opensAt: "08:00", closesAt: "13:00" })
		await tx.insert(marketDays).values({ producerId, id: marketDayId, marketId, marketOn: stall.on, state: "closed" })
		for (const method of ["cash", "card"] as const)
			for (const cents of stall[method] ?? []) {
				const id = randomUUID()
				await tx.insert(sales).values({
					producerId,
					id,
					marketDayId,
					method,
					state: "paid",
					totalCents: cents,
					givenCents: method === "cash" ? cents : null,
					stripePaymentIntentId: method === "card" ? `pi_${id}` : null,
					soldBy: at.personId,
					paidAt: new Date(`${stall.on}T15:00:00Z`),
				})
				await tx
					.insert(saleLines)
					.values({ producerId, saleId: id, productId: at.productId, pieces: 1, pieceCents: cents })
			}
	})
}

/** The file of a period, whole. */
export async function fileOf(at: MoneyYard, from: Day, to: Day): Promise<string> {
	let file = ""
	for await (const part of listEntries({ producer: at.producer, from, to })) file += part
	return file
}

/** The lines of a file below its head, each "20260803-001 1200 126.25 0": entry, account number, debit, credit. */
export function linesOf(
	file: string,
): { entry: string; account: string; debitCents: number; creditCents: number; about: string }[] {
	const { data } = Papa.parse<string[]>(file.replace("\uFEFF", "").trimEnd())
	const cents = (text = "") => Math.round(Number(text) * 100)
	return data.slice(1).map(([entry = "", , account = "", , debit, credit, about = ""]) => ({
		entry,
		account,
		debitCents: cents(debit),
		creditCents: cents(credit),
		about,
	}))
}

/** Debits and credits of all lines. */
export function sumOf(file: string): { debitCents: number; creditCents: number } {
	const lines = linesOf(file)
	return {
		debitCents: lines.reduce((sum, { debitCents }) => sum + debitCents, 0),
		creditCents: lines.reduce((sum, { creditCents }) => sum + creditCents, 0),
	}
}
