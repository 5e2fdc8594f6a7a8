import { randomUUID } from "node:crypto"
import { expect, test } from "@playwright/test"
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

const producer = "(select id from producers where slug = 'larkmoor')"

/** A confirmed order of Pantry & Plume of its own: four cases given of four asked, its letter long gone. */
async function openConfirmed() {
	const order = { id: randomUUID(), lineId: randomUUID() }
	const on = new Date(Date.now() + 45 * 86_400_000).toISOString().slice(0, 10)
	const [made] = await askDatabase<{ number: number }>(
		`insert into orders (producer_id, id, number, store_id, delivery_on, state)
		select ${producer}, $1, (select greatest(max(number), 960000)::int + 1 from orders where number < 970000), id, $2, 'confirmed'
		from stores where slug = 'pantry-and-plume' returning number`,
		[order.id, on],
	)
	await askDatabase(
		`insert into order_lines (producer_id, id, order_id, product_id, asked_cases, given_cases, case_cents, pieces_per_case)
		select ${producer}, $1, $2, id, 4, 4, 11400, pieces_per_case from products where producer_id = ${producer}
		order by length(code), code limit 1`,
		[order.lineId, order.id],
	)
	const given = async () => {
		const rows = await askDatabase<{ given: number }>("select given_cases as given from order_lines where id = $1", [
			order.lineId,
		])
		return rows[0]?.given
	}
	const clear = () => askDatabase("update orders set state = 'cancelled' where id = $1", [order.id])
	return { ...order, number: made?.number ?? 0, given, clear }
}

let order: Awaited<ReturnType<typeof openConfirmed>>
test.beforeEach(async () => {
	order = await openConfirmed()
})
test.afterEach(async () => {
	await order.clear()
})

test("both sides write about an order, and a change that gives less waits for the store's yes", async ({ browser }) => {
	test.slow()
	const ida = await visitAs(browser, IDA)
	const tobias = await visitAs(browser, TOBIAS)
	const faults = [watchFaults(ida), watchFaults(tobias)]
	await tobias.goto(`${STORE}/orders/${order.number}`)
	await untilHydrated(tobias)
	await tobias.getByLabel("Write to Larkmoor").fill("Is the back door open on Tuesday?")
	await tobias.getByRole("button", { name: "Send the message" }).click()
	await expect(tobias.getByText("has your message.")).toBeVisible()

	await ida.goto(`${DESK}/orders/${order.number}`)
	await untilHydrated(ida)
	await expect(ida.getByText("Is the back door open on Tuesday?")).toBeVisible()
	await ida.getByLabel("Write to Pantry & Plume").fill("From seven on.")
	await ida.getByRole("button", { name: "Send the message" }).click()
	await expect(ida.getByText("has your message.")).toBeVisible()
	await expect(ida.getByLabel("Write to Pantry & Plume")).toHaveValue("")

	await ida.locator("summary", { hasText: "Change what was confirmed" }).click()
	await ida.getByLabel("Cases, 4 asked").fill("2")
	await ida.getByRole("button", { name: "Change it and tell Pantry & Plume" }).click()
	await expect(ida.getByRole("alert")).toContainText("Write why")
	await expect(ida.getByLabel("Cases, 4 asked")).toHaveValue("2")
	await expectNoFindings(ida)
	await ida.getByLabel("Why", { exact: true }).fill("A super was lost to a storm.")
	await ida.getByRole("button", { name: "Change it and tell Pantry & Plume" }).click()
	await expect(ida.getByText("Waits for Pantry & Plume to accept")).toBeVisible()
	await expectNoFindings(ida)
	expect(await order.given()).toBe(4)

	await tobias.goto(`${STORE}/orders/${order.number}`)
	await untilHydrated(tobias)
	await expect(tobias.getByText("From seven on.")).toBeVisible()
	await expect(tobias.getByText("2 cases instead of 4.")).toBeVisible()
	await expectNoFindings(tobias)
	await tobias.getByRole("button", { name: "Accept the change" }).click()
	await expect(tobias.getByText("You have accepted the change.")).toBeVisible()
	expect(await order.given()).toBe(2)
	await ida.goto(`${DESK}/orders/${order.number}`)
	await expect(ida.getByText("Change accepted")).toBeVisible()
	const letters = await askDatabase<{ template: string }>(
		"select distinct template from outbox_mails where template = any($1) and props->>'orderNumber' = $2 order by 1",
		[["order-message", "order-proposal", "order-answer"], String(order.number)],
	)
	expect(letters.map(({ template }) => template)).toEqual(["order-answer", "order-message", "order-proposal"])
	// The refusal above is a 422, which the browser notes.
	expect(faults.flat().filter((fault) => !fault.includes("422"))).toEqual([])
})

test.describe("without JavaScript", () => {
	test("a message that says nothing is refused beside its field, and letters are chosen on Our details", async ({
		browser,
	}) => {
		const tobias = await visitAs(browser, TOBIAS, { javaScriptEnabled: false, viewport: { width: 390, height: 844 } })
		await tobias.goto(`${STORE}/orders/${order.number}`)
		await tobias.getByLabel("Write to Larkmoor").fill("   ")
		await tobias.getByRole("button", { name: "Send the message" }).click()
		await expect(tobias.getByRole("alert")).toContainText("Write something first.")

		await tobias.goto(`${STORE}/details`)
		await tobias.getByRole("checkbox", { name: "Reminders" }).uncheck()
		await tobias.getByRole("button", { name: "Keep this choice" }).click()
		await expect(tobias.getByText("Your letters are as you chose.")).toBeVisible()
		await expect(tobias.getByRole("checkbox", { name: "Reminders" })).not.toBeChecked()
		await expect(tobias.getByRole("checkbox", { name: "Messages" })).toBeChecked()
		await tobias.getByRole("checkbox", { name: "Reminders" }).check()
		await tobias.getByRole("button", { name: "Keep this choice" }).click()
		await expect(tobias.getByRole("checkbox", { name: "Reminders" })).toBeChecked()
	})
})

test("the season ahead is drawn, with its figures in words, in a table and as a file", async ({ browser }) => {
	const ida = await visitAs(browser, IDA)
	const faults = watchFaults(ida)
	await ida.goto(`${DESK}/season`)
	await untilHydrated(ida)
	await expect(ida.getByRole("heading", { name: "The season ahead" })).toBeVisible()
	await expect(ida.getByRole("img", { name: /26 weeks from/ }).first()).toBeVisible()
	await expectNoFindings(ida)
	const file = await ida.request.get(`${DESK}/season.csv`)
	expect(file.headers()["content-type"]).toContain("text/csv")
	expect((await file.text()).split("\r\n")[0]).toContain("Short at the low figure, cases")
	expect(faults).toEqual([])
})
