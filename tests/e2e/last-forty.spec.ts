import { randomUUID } from "node:crypto"
import { expect, test } from "@playwright/test"
import { e2eAddresses } from "../setup/e2e-addresses"
import { openSeasonYard } from "./season-yard"

test("two hundred buyers who send their sheets at once are promised exactly the last forty cases", async () => {
	test.slow()
	const yard = await openSeasonYard()
	await yard.addLot("R2", 19)
	const [day] = yard.days
	const { web } = e2eAddresses()
	const buyers = await yard.addBuyers(200, day)
	const answers = await Promise.all(
		buyers.map(({ path, cookie }) => send(`${web}${path}`, { cookie, origin: web }, yard.productId)),
	)
	const orders = await yard.orders(day)
	expect(orders).toEqual(Array.from({ length: 40 }, () => expect.stringMatching(/^Store \d+ \? of 1, placed$/)))
	expect(answers.filter(({ status }) => status === 302)).toHaveLength(40)
	const refused = answers.filter(({ status }) => status !== 302)
	expect(new Set(refused.map(({ status }) => status))).toEqual(new Set([422]))
	for (const { text } of refused) expect(text).toContain("None is free")
})

/** Sends a sheet for one case; one that the server had no time for is sent again as it is, as its buyer would. */
async function send(url: string, headers: Record<string, string>, productId: string) {
	const fields = { idempotencyKey: randomUUID(), [`cases-${productId}`]: "1", poNumber: "", note: "" }
	for (let tries = 1; ; tries += 1) {
		const response = await fetch(url, {
			method: "POST",
			headers: { ...headers, "content-type": "application/x-www-form-urlencoded" },
			body: new URLSearchParams(fields).toString(),
			redirect: "manual",
		})
		const text = await response.text()
		if (response.status < 500 || tries === 20) return { status: response.status, text }
	}
}
