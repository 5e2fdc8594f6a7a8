import { expect, test } from "@playwright/test"
import sharp from "sharp"
import { openInbox } from "./auth-mails"
import {
	askDatabase,
	DESK,
	expectNoFindings,
	IDA,
	STORE,
	TOBIAS,
	untilHydrated,
	visitAs,
	watchFaults,
} from "./desk-visits"

const LARKMOOR = "(select id from producers where slug = 'larkmoor')"

/** A delivery to Pantry & Plume with something to pay, the first in two months, and a desk that takes reports so long. */
async function openDelivery() {
	const [settings] = await askDatabase<{ days: number }>(
		`select breakage_days as days from producer_settings where producer_id = ${LARKMOOR}`,
	)
	const setDays = (days: number) =>
		askDatabase(`update producer_settings set breakage_days = $1 where producer_id = ${LARKMOOR}`, [days])
	await setDays(60)
	const [invoice] = await askDatabase<{ id: string; number: string; openCents: number }>(
		`select i.id, i.year || '-' || lpad(i.sequence::text, 4, '0') as number, i.open_cents as "openCents" from invoices i
		join stores s on s.id = i.store_id and s.slug = 'pantry-and-plume'
		where i.open_cents > 20000 and exists (
			select from invoice_lines l join orders o on o.id = l.order_id
			join order_line_lots x on x.order_line_id = l.order_line_id
			where l.invoice_id = i.id and o.delivery_on > current_date - 55 and l.sent_cases > 0)
		order by i.issued_on limit 1`,
	)
	if (!invoice) throw new Error("the demo has no such invoice")
	return { ...invoice, close: () => setDays(settings?.days ?? 3) }
}

/** A photo as a phone takes it. */
const photo = (name: string, background: string) =>
	sharp({ create: { width: 1200, height: 900, channels: 3, background } })
		.jpeg()
		.toBuffer()
		.then((buffer) => ({ name, mimeType: "image/jpeg", buffer }))

let delivery: Awaited<ReturnType<typeof openDelivery>>
test.beforeAll(async () => {
	delivery = await openDelivery()
})
test.afterAll(async () => {
	await delivery.close()
})

test("a store reports broken comb with photos, the desk credits a part of it, and both see what it came to", async ({
	browser,
}) => {
	test.slow()
	const tobias = await visitAs(browser, TOBIAS)
	const ida = await visitAs(browser, IDA)
	const faults = [watchFaults(tobias), watchFaults(ida)]
	await tobias.goto(`${STORE}/invoices/${delivery.number}`)
	await untilHydrated(tobias)
	await tobias.getByRole("link", { name: "Something arrived broken" }).click()
	await expect(tobias.getByRole("heading", { name: "Something arrived broken" })).toBeVisible()

	await test.step("a file that is no photo is said beside its field, and all else is kept", async () => {
		const line = tobias.locator("fieldset").first()
		await line.getByLabel("Pieces broken").fill("4")
		await line.getByLabel("What is broken").fill("Cappings crushed at one corner")
		await line
			.getByLabel("Photos", { exact: true })
			.setInputFiles([
				await photo("corner.jpg", "#b0660f"),
				{ name: "letter.jpg", mimeType: "image/jpeg", buffer: Buffer.from("no photo at all") },
			])
		await tobias.getByLabel("About the whole delivery").fill("The lowest case was wet.")
		await tobias.getByRole("button", { name: /^Report it to/ }).click()
		await expect(tobias.getByRole("alert")).toContainText("letter.jpg: This file is no JPEG, PNG or WebP")
		await untilHydrated(tobias)
		await expect(line.getByLabel("Pieces broken")).toHaveValue("4")
		await expect(line.getByLabel("What is broken")).toHaveValue("Cappings crushed at one corner")
		await expect(tobias.getByLabel("About the whole delivery")).toHaveValue("The lowest case was wet.")
		await expect(line.getByLabel("Photo 1 is kept")).toBeChecked()
		await expectNoFindings(tobias)
		await line.getByLabel("More photos").setInputFiles([await photo("tray.png", "#857465")])
		const inbox = await openInbox(IDA)
		await tobias.getByRole("button", { name: /^Report it to/ }).click()
		await expect(tobias.getByRole("status")).toContainText("has your report")
		await expectNoFindings(tobias)
		expect((await inbox()).subject).toContain("4 pieces broken")
	})
	const report = new URL(tobias.url()).pathname.split("/").at(-1) ?? ""

	await test.step("the desk looks at the photos and may not give less without a sentence", async () => {
		await ida.goto(`${DESK}/breakage`)
		await untilHydrated(ida)
		await expectNoFindings(ida)
		await ida.locator(`a[href$="/breakage/${report}"]`).click()
		const photos = ida.getByRole("img", { name: /broken, [12] of 2$/ })
		await expect(photos).toHaveCount(2)
		for (const one of await photos.all()) {
			await one.scrollIntoViewIfNeeded()
			await expect.poll(() => one.evaluate((img) => (img as HTMLImageElement).naturalWidth)).toBe(1200)
		}
		const picture = await ida.request.get((await photos.first().getAttribute("src")) ?? "")
		expect(picture.headers()).toMatchObject({ "content-type": "image/jpeg", "x-content-type-options": "nosniff" })
		await ida.getByLabel("Pieces to credit").fill("3")
		await ida.getByRole("button", { name: /^Credit these pieces/ }).click()
		await expect(ida.getByRole("alert")).toContainText("Write a sentence to the store")
		await expect(ida.getByLabel("Pieces to credit")).toHaveValue("3")
		await expectNoFindings(ida)
	})

	await test.step("the answer is a credit, a letter with its PDF, and pieces written off", async () => {
		const inbox = await openInbox(TOBIAS)
		await ida
			.getByLabel("Your sentence to Pantry & Plume")
			.fill("Three were crushed on our way; the fourth is weeping comb.")
		await ida.getByRole("button", { name: /^Credit these pieces/ }).click()
		await expect(ida.getByRole("status")).toContainText("Pantry & Plume is told.")
		await expectNoFindings(ida)
		const letter = await inbox()
		expect(letter.subject).toMatch(/credit C\d{4}-\d{4}, \$\d+\.\d\d for you/)
		expect(letter.text).toContain("Three were crushed on our way")
		expect(letter.text).toContain("3 of 4 pieces")
		const moved = await askDatabase<{ pieces: number }>(
			`select coalesce(sum(pieces), 0)::int as pieces from stock_moves
			where from_place = 'sold' and to_place = 'waste' and reason = $1`,
			[`arrived broken, invoice ${delivery.number}`],
		)
		expect(moved[0]?.pieces).toBe(3)
		const [now] = await askDatabase<{ openCents: number; creditedCents: number }>(
			`select open_cents as "openCents", credited_cents as "creditedCents" from invoices where id = $1`,
			[delivery.id],
		)
		expect((now?.openCents ?? 0) + (now?.creditedCents ?? 0)).toBe(delivery.openCents)
	})

	await test.step("the store finds the answer, its credit and the printed page", async () => {
		await tobias.goto(`${STORE}/breakage/${report}`)
		await expect(tobias.getByText("the fourth is weeping comb")).toBeVisible()
		await tobias.getByRole("link", { name: /^credit C/ }).click()
		await expect(tobias.getByRole("heading", { name: /^Credit C/ })).toBeVisible()
		await untilHydrated(tobias)
		await expectNoFindings(tobias)
		const pdf = await tobias.request.get(`${tobias.url()}.pdf`)
		expect(pdf.headers()["content-type"]).toBe("application/pdf")
		await tobias.goto(`${STORE}/credits`)
		await expect(tobias.getByRole("row").filter({ hasText: "comb that arrived broken" })).not.toHaveCount(0)
		await expectNoFindings(tobias)
	})

	await test.step("the desk sees where comb breaks, and credits a price by hand", async () => {
		for (const by of ["lot", "round", "product"]) {
			await ida.goto(`${DESK}/breakage/where?by=${by}`)
			await expect(ida.getByRole("img", { name: `Broken pieces by ${by}` })).toBeVisible()
		}
		await untilHydrated(ida)
		await expectNoFindings(ida)
		await ida.goto(`${DESK}/invoices/${delivery.number}`)
		await untilHydrated(ida)
		await ida.getByRole("link", { name: "Credit it" }).click()
		await ida.getByLabel("Why, as the store reads it").fill("The price for three was promised.")
		await ida.getByLabel("An amount off the invoice as a whole").fill("100000")
		await ida.getByRole("button", { name: /^Issue the credit/ }).click()
		await expect(ida.getByRole("alert")).toContainText("can still be credited")
		await expectNoFindings(ida)
		await ida.getByLabel("An amount off the invoice as a whole").fill("")
		await ida
			.getByLabel(/^Amount off/)
			.first()
			.fill("5.70")
		await ida.getByRole("button", { name: /^Issue the credit/ }).click()
		await expect(ida.getByRole("status")).toContainText("is issued")
		await expect(ida.getByText("a price put right")).toBeVisible()
	})
	// The browser notes a form that comes back as 422, as it should.
	expect(faults.flat().filter((fault) => !fault.includes("status of 422"))).toEqual([])
	await Promise.all([tobias.context().close(), ida.context().close()])
})

test("without a script the report is made all the same, and a report that comes too late says whom to write to", async ({
	browser,
}) => {
	const tobias = await visitAs(browser, TOBIAS, { javaScriptEnabled: false, viewport: { width: 390, height: 844 } })
	await tobias.goto(`${STORE}/invoices/${delivery.number}/breakage`)
	await tobias.getByRole("button", { name: /^Report it to/ }).click()
	await expect(tobias.getByText("Write at one line or more how many pieces are broken.")).toBeVisible()
	await tobias.locator("fieldset").first().getByLabel("Pieces broken").fill("1")
	await tobias.getByRole("button", { name: /^Report it to/ }).click()
	await expect(tobias.getByText("has your report.")).toBeVisible()
	await expect(tobias.getByText("1 piece", { exact: true })).toBeVisible()
	await delivery.close()
	await tobias.goto(`${STORE}/invoices/${delivery.number}/breakage`)
	await expect(tobias.getByText("could be reported until")).toBeVisible()
	await expect(tobias.getByText("orders@larkmoor.example.test")).toBeVisible()
	await tobias.context().close()
})
