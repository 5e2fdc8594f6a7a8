import { randomUUID } from "node:crypto"
import { eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { onlinePaymentParts, onlinePayments, remindersSent, stores } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { findRemindersPage } from "~/services/receivables/find-reminders-page.server"
import { sendReminders } from "~/services/receivables/send-reminders.server"
import { saveReminderStep, switchReminders, takeFirstSteps } from "~/services/receivables/set-reminders.server"
import { addHand } from "../desk/desk-steps"
import { findOutbox, openStore, openYard, type Shop, type Yard } from "../orders/place-yard"
import { openAccount, writeLetters } from "./account"

/** A week after invoices due on August 15; nine in the morning in the yard's zone. */
const MORNING = new Date("2026-08-22T13:00:00Z")

async function openSchedule() {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	await takeFirstSteps({ producerId: yard.producerId, personId })
	return { yard, shop, personId, account: openAccount(shop, personId) }
}

const send = (yard: Yard, now = MORNING) => sendReminders({ producerId: yard.producerId, now })

async function lettersOf(yard: Yard) {
	const letters = await findOutbox(yard.producerId)
	return letters
		.filter(({ template }) => template === "reminder")
		.map(({ recipient, props }) => ({ recipient, ...props }))
}

describe("a reminder", () => {
	test("names all invoices that have reached its step, in the producer's words, in one letter to the store", async () => {
		const { yard, shop, account } = await openSchedule()
		await account.invoice(92_990)
		await account.invoice(10_010)
		await account.invoice(5_000, { dueOn: "2026-09-20" })
		expect(await send(yard)).toEqual({ letters: 1 })
		const [letter, ...others] = await lettersOf(yard)
		expect(others).toEqual([])
		expect(letter).toMatchObject({
			recipient: shop.person.email,
			subject: "Larkmoor Bee Yard: $1,030.00 was due on August 15, 2026",
			invoices: [
				{ number: "2026-0001", openCents: 92_990 },
				{ number: "2026-0002", openCents: 10_010 },
			],
		})
		expect(await writeLetters(yard.producerId)).toEqual(["Larkmoor Bee Yard: $1,030.00 was due on August 15, 2026"])
		expect(letter).toHaveProperty("body", expect.stringContaining("invoice 2026-0001 and 2026-0002"))
	})

	test("goes once, however often the job runs, hours late, and by two workers at once", async () => {
		const { yard, account } = await openSchedule()
		await account.invoice(92_990)
		const runs = await Promise.all([send(yard), send(yard), send(yard)])
		expect(runs.reduce((sum, { letters }) => sum + letters, 0)).toBe(1)
		await send(yard, new Date("2026-08-22T22:00:00Z"))
		await send(yard, new Date("2026-08-23T13:00:00Z"))
		expect(await lettersOf(yard)).toHaveLength(1)
		const noted = await readProducer(yard.producerId, (tx) => tx.select().from(remindersSent))
		expect(noted).toHaveLength(1)
	})

	test("does not go before seven in the producer's own morning", async () => {
		const { yard, account } = await openSchedule()
		await account.invoice(92_990)
		expect(await send(yard, new Date("2026-08-22T10:59:00Z"))).toEqual({ letters: 0 })
		expect(await send(yard, new Date("2026-08-22T11:00:00Z"))).toEqual({ letters: 1 })
	})

	test("of what came later on the same day is a letter of its own", async () => {
		const { yard, account } = await openSchedule()
		await account.invoice(92_990)
		await send(yard)
		await account.invoice(5_000)
		expect(await send(yard)).toEqual({ letters: 1 })
		expect(await lettersOf(yard)).toHaveLength(2)
	})
})

describe("no reminder goes", () => {
	const nothingGoes = async (prepare: (facts: Awaited<ReturnType<typeof openSchedule>>) => Promise<unknown>) => {
		const facts = await openSchedule()
		await prepare(facts)
		expect(await send(facts.yard)).toEqual({ letters: 0 })
		expect(await lettersOf(facts.yard)).toEqual([])
	}

	test("to a store on hold", () =>
		nothingGoes(async ({ shop, account }) => {
			await account.invoice(92_990)
			await setStore(shop, { remindersHeld: true })
		}))

	test("while the producer has turned them off", () =>
		nothingGoes(async ({ yard, personId, account }) => {
			await account.invoice(92_990)
			await switchReminders({ producerId: yard.producerId, personId, on: false })
		}))

	test("of what was paid meanwhile", () =>
		nothingGoes(async ({ account }) => {
			const invoice = await account.invoice(92_990)
			const paymentId = await account.payment(92_990)
			await account.settle(invoice, 92_990, { kind: "payment", paymentId })
		}))

	test("of what is on its way from the bank", () =>
		nothingGoes(async ({ shop, account }) => {
			const invoice = await account.invoice(92_990)
			await putOnItsWay(shop, invoice, 92_990)
		}))

	test("of what the money on the store's account would pay", () =>
		nothingGoes(async ({ account }) => {
			await account.invoice(92_990)
			await account.payment(92_990)
		}))

	test("of a step that rests", () =>
		nothingGoes(async ({ yard, personId, account }) => {
			await account.invoice(92_990)
			const { steps } = await findRemindersPage({ producerId: yard.producerId })
			const week = steps.find(({ daysAfterDue }) => daysAfterDue === 7)
			if (!week) throw new Error("there is a step a week after")
			const { id, ...step } = week
			await saveReminderStep({ producerId: yard.producerId, personId, id, step: { ...step, isActive: false } })
		}))
})

test("what is half on its way is reminded of by its other half", async () => {
	const { yard, shop, account } = await openSchedule()
	const invoice = await account.invoice(92_990)
	await putOnItsWay(shop, invoice, 90_000)
	expect(await send(yard)).toEqual({ letters: 1 })
	expect(await lettersOf(yard)).toMatchObject([{ invoices: [{ openCents: 2_990 }] }])
})

test("a schedule has one step for a day", async () => {
	const { yard, personId } = await openSchedule()
	const step = { daysAfterDue: 7, subject: "Again", body: "Again", isActive: true }
	const by = { producerId: yard.producerId, personId }
	expect(await saveReminderStep({ ...by, id: randomUUID(), step })).toEqual({ ok: false, reason: "day-taken" })
	const id = randomUUID()
	expect(await saveReminderStep({ ...by, id, step: { ...step, daysAfterDue: 14 } })).toEqual({ ok: true })
	expect(await saveReminderStep({ ...by, id, step: { ...step, daysAfterDue: 10 } })).toEqual({ ok: true })
	const { steps } = await findRemindersPage(by)
	expect(steps.map(({ daysAfterDue }) => daysAfterDue)).toEqual([-3, 7, 10, 21])
})

test("what was written stands on the page, by store and step", async () => {
	const { yard, shop, account } = await openSchedule()
	await account.invoice(92_990)
	await account.invoice(1_000)
	await send(yard)
	const { sent } = await findRemindersPage({ producerId: yard.producerId })
	expect(sent).toMatchObject([{ storeSlug: shop.slug, daysAfterDue: 7, invoices: 2 }])
})

function setStore(shop: Shop, facts: Partial<typeof stores.$inferInsert>) {
	return withProducer(shop.producerId, (tx) => tx.update(stores).set(facts).where(eq(stores.id, shop.storeId)))
}

async function putOnItsWay(shop: Shop, invoiceId: string, amountCents: number) {
	const { producerId, storeId } = shop
	const id = randomUUID()
	await withProducer(producerId, async (tx) => {
		await tx.insert(onlinePayments).values({
			producerId,
			id,
			storeId,
			method: "bank-debit",
			amountCents,
			state: "on-its-way",
			startedBy: shop.person.id,
		})
		await tx.insert(onlinePaymentParts).values({ producerId, onlinePaymentId: id, invoiceId, amountCents })
	})
}
