import { type Browser, expect, type Page, test } from "@playwright/test"
import { readPdf } from "../emails/pdf-text"
import { e2eAddresses } from "../setup/e2e-addresses"
import { type CaughtMail, linkIn, openInbox } from "./auth-mails"
import {
	askDatabase,
	DESK,
	expectNoFindings,
	hurryLetters,
	IDA,
	ROSA,
	STORE,
	switchPayments,
	TOBIAS,
	typeCard,
	untilHydrated,
	visitAs,
	watchFaults,
} from "./desk-visits"

const DECLINED = "4000 0000 0000 0002"
const GOOD = "4242 4242 4242 4242"

/** Orders for Pantry & Plume as its buyer does: 3 cases that are there, and 99 that are not, to be shared out. */
async function placeShortOrder(browser: Browser): Promise<string> {
	const rosa = await visitAs(browser, ROSA)
	await rosa.goto(`${STORE}/sheet`)
	await untilHydrated(rosa)
	const casesOf = (code: string) =>
		rosa
			.getByRole("row")
			.filter({ hasText: new RegExp(`^${code}`) })
			.getByRole("textbox")
	await casesOf("11").fill("3")
	await casesOf("21").fill("99")
	await rosa.getByLabel(/^Take \d+, wait for \d+ more$|^Wait on the list for 99$/).check()
	await rosa.getByRole("button", { name: "Send order" }).click()
	await expect(rosa.getByRole("status").filter({ hasText: "has your order" })).toBeVisible()
	const number = /Order (\d+)/.exec((await rosa.getByRole("heading", { level: 1 }).textContent()) ?? "")?.[1]
	await rosa.context().close()
	if (!number) throw new Error("the page names the order")
	return number
}

const givenOf = (page: Page, product: string) => page.getByLabel(`Cases of ${product} given`)
const BASSWOOD = "Basswood section, clover"

type Attachment = { filename: string; generatedFileName: string; contentType: string }

/** The one file that came with a letter. */
async function attachmentOf(mail: CaughtMail): Promise<{ name: string; type: string; bytes: Buffer }> {
	const address = `${e2eAddresses().mail}/api/email/${mail.id}`
	const { attachments = [] } = (await (await fetch(address)).json()) as { attachments?: Attachment[] }
	const [file] = attachments
	if (!file || attachments.length > 1) throw new Error(`one file comes with the letter, not ${attachments.length}`)
	const answer = await fetch(`${address}/attachment/${file.generatedFileName}`)
	return { name: file.filename, type: file.contentType, bytes: Buffer.from(await answer.arrayBuffer()) }
}

const textOf = (pdf: Buffer) => readPdf(pdf).pages.join(" ").replace(/\s+/g, " ")

/** The next letter with such a subject; others that come before it are passed over. */
async function nextAbout(next: () => Promise<CaughtMail>, subject: RegExp): Promise<CaughtMail> {
	for (;;) {
		const mail = await next()
		if (subject.test(mail.subject)) return mail
	}
}

test.afterEach(() => switchPayments({ repeatEvents: 0, holdEvents: false, failNext: null }))

test("the desk confirms a short order, packs and sends it; the store reads why, and pays the invoice once", async ({
	browser,
}) => {
	test.setTimeout(300_000)
	const number = await placeShortOrder(browser)
	const ida = await visitAs(browser, IDA)
	const faults = watchFaults(ida)

	await test.step("the order waits on To do", async () => {
		await ida.goto(DESK)
		await untilHydrated(ida)
		await expect(ida.getByRole("heading", { level: 3, name: /^Confirm .* orders? for / }).first()).toBeVisible()
		await expectNoFindings(ida)
		await ida.getByRole("link", { name: `Decide what order ${number} of Pantry & Plume gets` }).click()
		await expect(ida.getByRole("heading", { level: 1 })).toHaveText(`Order ${number}, Pantry & Plume`)
		await expectNoFindings(ida)
	})

	await test.step("wrong figures come back with their reasons, and nothing typed is lost", async () => {
		const confirm = ida.getByRole("button", { name: "Confirm and tell Pantry & Plume" })
		const refusals: [typed: string, reason: RegExp][] = [
			["-1", /Cases cannot be less than none/],
			["2.5", /Only whole cases are sold/],
			["1000000000", /at most 999 cases/],
			["two", /in figures/],
			["", /0 for none/],
			["100", /more than was asked for: 99 cases/],
			["99", /^\d+ cases? can be given\.|^None can be given\./],
		]
		await ida.getByLabel(`Why ${BASSWOOD} is less than asked`).fill("Rain kept the bees in")
		for (const [typed, reason] of refusals) {
			await givenOf(ida, BASSWOOD).fill(typed)
			await confirm.click()
			await expect(givenOf(ida, BASSWOOD)).toHaveAccessibleDescription(reason)
			await expect(ida.getByRole("alert")).toContainText(`21 ${BASSWOOD}:`)
			await expect(givenOf(ida, BASSWOOD)).toHaveValue(typed)
			await expect(ida.getByLabel(`Why ${BASSWOOD} is less than asked`)).toHaveValue("Rain kept the bees in")
		}
		// The browser notes each refusal's status by itself.
		expect(faults.splice(0).map((fault) => fault.includes("422"))).toEqual(refusals.map(() => true))
		await expectNoFindings(ida)
	})

	const nextForRosa = await openInbox(ROSA)
	await test.step("a confirmation is taken back while its letter has not gone, then made again", async () => {
		await givenOf(ida, BASSWOOD).fill("2")
		await ida.getByRole("button", { name: "Confirm and tell Pantry & Plume" }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} is confirmed.`)
		await ida.getByRole("link", { name: "To do" }).first().click()
		await ida.getByRole("button", { name: `Undo the confirmation of order ${number} of Pantry & Plume` }).click()
		await expect(ida.getByRole("status")).toContainText("No letter went out.")
		await ida.getByRole("link", { name: `Decide what order ${number} of Pantry & Plume gets` }).click()
		await givenOf(ida, BASSWOOD).fill("2")
		await ida.getByLabel(`Why ${BASSWOOD} is less than asked`).fill("Rain kept the bees in")
		await ida.getByRole("button", { name: "Confirm and tell Pantry & Plume" }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} is confirmed.`)
		await expectNoFindings(ida)
	})

	await test.step("the letter says in a sentence what is short", async () => {
		await hurryLetters()
		const letter = await nextAbout(nextForRosa, /^Confirmed/)
		expect(letter.subject).toMatch(/^Confirmed, but short: your order for /)
		expect(letter.text.replace(/\s+/g, " ")).toContain(
			`You asked for 99 cases of ${BASSWOOD}, and get 2. Rain kept the bees in.`,
		)
		await ida.reload()
		await expect(ida.getByRole("button", { name: "Undo the confirmation" })).toHaveCount(0)
	})

	await test.step("it is packed from lots, then sent", async () => {
		await ida.getByRole("button", { name: "Packed", exact: true }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} is packed.`)
		await expect(ida.getByRole("heading", { name: "Packed from" })).toBeVisible()
		await ida.getByRole("link", { name: "Packing", exact: true }).first().click()
		await untilHydrated(ida)
		await expectNoFindings(ida)
		const day = await askDatabase<{ day: string }>("select delivery_on::text as day from orders where number = $1", [
			number,
		])
		await ida.goto(`${DESK}/packing?day=${day[0]?.day}`)
		await ida.getByRole("button", { name: `Sent, issue the invoice: order ${number} of Pantry & Plume` }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} is sent`)
		expect(faults).toEqual([])
	})

	const nextForTobias = await openInbox(TOBIAS)
	const invoiceLetter = await nextAbout(nextForRosa, /invoice/)
	const invoice = /invoice (\d{4}-\d{4})/.exec(invoiceLetter.subject)?.[1] ?? ""
	await test.step("the invoice is mailed with a PDF that says the same", async () => {
		const pdf = await attachmentOf(invoiceLetter)
		expect(pdf).toMatchObject({ name: `invoice-${invoice}.pdf`, type: "application/pdf" })
		const text = textOf(pdf.bytes)
		expect(text).toContain(`Invoice ${invoice}`)
		expect(text).toContain("2 sent of 99 asked")
		expect(invoiceLetter.text.replace(/\s+/g, " ")).toContain("Rain kept the bees in.")
	})

	await test.step("a buyer sees who can pay it", async () => {
		const rosa = await visitAs(browser, ROSA)
		await rosa.goto(linkIn(invoiceLetter, "/invoices/"))
		await expect(rosa.getByText("Tobias Amory can pay it by card")).toBeVisible()
		await expect(rosa.getByRole("button", { name: /^Pay/ })).toHaveCount(0)
		const file = await rosa.request.get(`${STORE}/invoices/${invoice}.pdf`)
		expect(file.headers()["content-type"]).toBe("application/pdf")
		expect(textOf(await file.body())).toContain(`Invoice ${invoice}`)
		await expectNoFindings(rosa)
		await rosa.context().close()
	})

	const tobias = await visitAs(browser, TOBIAS)
	const tobiasFaults = watchFaults(tobias)
	await test.step("the payment service does not answer: it says so, and trying again works", async () => {
		await tobias.goto(`${STORE}/invoices`)
		await expectNoFindings(tobias)
		await tobias.getByRole("link", { name: invoice }).click()
		await expect(tobias.getByRole("heading", { level: 1 })).toHaveText(`Invoice ${invoice}`)
		await untilHydrated(tobias)
		await expectNoFindings(tobias)
		await switchPayments({ failNext: { count: 3, status: 500, path: "/v1/checkout/sessions" } })
		await tobias.getByRole("button", { name: /^Pay \$[\d,.]+ by card$/ }).click()
		await expect(tobias.getByRole("alert")).toContainText("The payment service does not answer.")
		// The answer was a 503, which the browser notes by itself.
		expect(tobiasFaults.splice(0).join()).toMatch(/503/)
	})

	await test.step("a declined card says so and leaves the invoice open", async () => {
		await switchPayments({ repeatEvents: 1 })
		await tobias.getByRole("button", { name: /^Pay \$[\d,.]+ by card$/ }).click()
		await tobias.waitForURL(`${e2eAddresses().stripe}/**`)
		await typeCard(tobias, DECLINED)
		await expect(tobias.getByRole("alert")).toContainText("Your card was declined.")
		await tobias.getByRole("link", { name: "Go back without paying" }).click()
		await expect(async () => {
			await tobias.reload()
			await expect(tobias.getByRole("alert")).toContainText("Your card was declined. The invoice is still open.", {
				timeout: 1_000,
			})
		}).toPass({ timeout: 30_000 })
		await expectNoFindings(tobias)
	})

	await test.step("a good card pays it, and each event that comes twice counts once", async () => {
		await untilHydrated(tobias)
		await tobias.getByRole("button", { name: /^Pay \$[\d,.]+ by card$/ }).click()
		await tobias.waitForURL(`${e2eAddresses().stripe}/**`)
		await typeCard(tobias, GOOD)
		await tobias.waitForURL(/\?paid=/)
		await expect(tobias.getByRole("status")).toContainText("Paid, thank you.", { timeout: 30_000 })
		await expect(tobias.getByRole("button", { name: /^Pay/ })).toHaveCount(0)
		await expectNoFindings(tobias)
		expect(tobiasFaults).toEqual([])
		expect((await nextAbout(nextForTobias, /has your payment of/)).text).toContain(invoice)
		const twice = await askDatabase<{ deliveries: number }>(
			"select deliveries from stripe_events where type = 'checkout.session.completed' order by received_at desc limit 1",
		)
		expect(twice).toEqual([{ deliveries: 2 }])
		const paid = await askDatabase<{ payments: number; isPaid: boolean }>(
			`select count(p.*)::int as payments, i.paid_cents = i.total_cents as "isPaid"
			from invoices i join settlements p on p.producer_id = i.producer_id and p.invoice_id = i.id
			where i.year || '-' || lpad(i.sequence::text, 4, '0') = $1 group by i.id, i.paid_cents, i.total_cents`,
			[invoice],
		)
		expect(paid).toEqual([{ payments: 1, isPaid: true }])
	})

	await test.step("the desk sees it paid", async () => {
		await ida.goto(`${DESK}/invoices/${invoice}`)
		await expect(ida.getByText("Nothing is open.")).toBeVisible()
		await ida.goto(`${DESK}/orders/${number}`)
		await expect(ida.getByRole("listitem").filter({ hasText: "Paid by Tobias Amory" })).toBeVisible()
		await ida.getByRole("button", { name: "It has arrived" }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} has arrived.`)
		expect(faults).toEqual([])
	})
})

test.describe("without JavaScript", () => {
	test("a payment by check is noted; a wrong amount keeps what was typed", async ({ browser }) => {
		const ida = await visitAs(browser, IDA, { javaScriptEnabled: false, viewport: { width: 390, height: 844 } })
		await ida.goto(`${DESK}/invoices?standing=open`)
		await ida.getByRole("row").nth(1).getByRole("link").first().click()
		const address = ida.url()
		const amount = ida.getByLabel("How much")
		const note = ida.getByRole("button", { name: "Note the payment" })
		for (const [typed, reason] of [
			["-5", /cannot be less than nothing/],
			["12.345", /dollars and cents/],
			["lots", /dollars and cents/],
			["", /how much came in/],
			["0", /more than nothing/],
			["99999999999", /more than one payment can be/],
		] as const) {
			await ida.getByLabel("Money came as").selectOption("transfer")
			await amount.fill(typed)
			await note.click()
			await expect(amount).toHaveAccessibleDescription(reason)
			await expect(amount).toHaveValue(typed)
			await expect(ida.getByLabel("Money came as")).toHaveValue("transfer")
		}
		await ida.goto(address)
		const openCents = async () =>
			Number(
				/\$([\d,]+\.\d\d) to be paid/
					.exec((await ida.getByText(/to be paid by/).textContent()) ?? "")?.[1]
					?.replace(/[,.]/g, ""),
			)
		const before = await openCents()
		await amount.fill("$1.25")
		// Both clicks of a double click send the form; it is the same payment.
		await note.dblclick()
		await expect(ida.getByRole("status")).toContainText("It settles $1.25 of invoice")
		expect(await openCents()).toBe(before - 125)
		await ida.context().close()
	})

	test("who has paid waits for the event, and the page shows it by itself", async ({ browser }) => {
		const tobias = await visitAs(browser, TOBIAS, { javaScriptEnabled: false })
		await switchPayments({ holdEvents: true })
		await tobias.goto(`${STORE}/invoices`)
		await tobias.getByRole("row").nth(1).getByRole("link").first().click()
		await tobias.getByRole("button", { name: /^Pay \$[\d,.]+ by card$/ }).click()
		await typeCard(tobias, GOOD)
		await expect(tobias.getByRole("status")).toContainText("Your payment is on its way.")
		await expect(tobias.getByRole("button", { name: /^Pay/ })).toHaveCount(0)
		await switchPayments({ holdEvents: false })
		await expect(tobias.getByRole("status")).toContainText("Paid, thank you.", { timeout: 30_000 })
		await tobias.context().close()
	})

	test("an order is confirmed and cancelled at the desk", async ({ browser }) => {
		const number = await placeShortOrder(browser)
		const ida = await visitAs(browser, IDA, { javaScriptEnabled: false })
		await ida.goto(`${DESK}/orders/${number}`)
		await givenOf(ida, BASSWOOD).fill("1")
		await ida.getByRole("button", { name: "Confirm and tell Pantry & Plume" }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} is confirmed.`)
		await ida.getByRole("button", { name: "Cancel this order" }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} is cancelled.`)
		await ida.context().close()
	})

	test("what is not there is not found, and tells nothing", async ({ browser }) => {
		const ida = await visitAs(browser, IDA, { javaScriptEnabled: false })
		for (const path of [
			...["orders/0", "orders/1000000", "orders/one", "lots/NONE", "invoices/2026-9999", "invoices/one"],
			"invoices/2026-9999.pdf",
		]) {
			expect((await ida.goto(`${DESK}/${path}`))?.status(), path).toBe(404)
		}
		expect((await ida.goto("/desk/tansy-knoll/orders"))?.status()).toBe(404)
		const rosa = await visitAs(browser, ROSA, { javaScriptEnabled: false })
		const [foreign] = await askDatabase<{ number: string }>(
			`select i.year || '-' || lpad(i.sequence::text, 4, '0') as number from invoices i
			join stores s on s.producer_id = i.producer_id and s.id = i.store_id where s.slug <> 'pantry-and-plume' limit 1`,
		)
		for (const path of [foreign?.number, `${foreign?.number}.pdf`, "2026-9999"]) {
			expect((await rosa.goto(`${STORE}/invoices/${path}`))?.status(), path).toBe(404)
		}
		await ida.context().close()
		await rosa.context().close()
	})
})

for (const width of [1440, 390]) {
	for (const part of ["", "orders", "packing", "lots", "invoices", "stores", "prices"]) {
		test(`the desk's ${part || "to do"} fits a screen of ${width} px, and axe finds nothing on it`, async ({
			browser,
		}) => {
			const ida = await visitAs(browser, IDA, { viewport: { width, height: 844 } })
			const faults = watchFaults(ida)
			await ida.goto(part ? `${DESK}/${part}` : DESK)
			await untilHydrated(ida)
			expect(await ida.evaluate(() => document.documentElement.scrollWidth)).toBe(width)
			await expectNoFindings(ida)
			if (part === "lots" || part === "invoices") {
				await ida.getByRole("row").nth(1).getByRole("link").first().click()
				await expect(ida.getByRole("heading", { level: 1, name: /^(Lot|Invoice) / })).toBeVisible()
				expect(await ida.evaluate(() => document.documentElement.scrollWidth)).toBe(width)
				await expectNoFindings(ida)
			}
			expect(faults).toEqual([])
			await ida.context().close()
		})
	}
}
