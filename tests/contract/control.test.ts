import { expect, test } from "vitest"
import { card, postForm, sessionOf, startFake, startFakeWithEndpoint } from "./harness"

const post = (url: string, body: object) => fetch(url, { method: "POST", body: JSON.stringify(body) })

test("switches are turned on, shown and turned off over HTTP", async () => {
	const { fake } = await startFake()
	const set = await post(`${fake.url}/_switches`, { failNext: { count: 2, status: 429 }, repeatEvents: 1 })
	expect(set.status).toBe(200)
	const shown = await (await fetch(`${fake.url}/_switches`)).json()
	expect(shown).toMatchObject({ failNext: { count: 2, status: 429 }, repeatEvents: 1, slowMs: 0, holdEvents: false })
	await post(`${fake.url}/_switches`, { failNext: null })
	expect(await (await fetch(`${fake.url}/_switches`)).json()).toMatchObject({ failNext: null, repeatEvents: 1 })
})

test("a switch that does not exist or has a wrong value is refused and nothing changes", async () => {
	const { fake } = await startFake()
	expect((await post(`${fake.url}/_switches`, { slowMs: 5, explode: true })).status).toBe(400)
	expect((await post(`${fake.url}/_switches`, { failNext: { count: 1, status: 418 } })).status).toBe(400)
	expect(await (await fetch(`${fake.url}/_switches`)).json()).toMatchObject({ slowMs: 0, failNext: null })
})

test("held events are flushed in reverse over HTTP", async () => {
	const { fake, stripe, endpoint } = await startFakeWithEndpoint()
	await post(`${fake.url}/_switches`, { holdEvents: true })
	const customer = await stripe.customers.create({ name: "Corner Store" })
	await stripe.customers.update(customer.id, { name: "Corner Shop" })
	await post(`${fake.url}/_events/flush`, { order: "reverse" })
	expect(endpoint.types()).toEqual(["customer.updated", "customer.created"])
})

test("a reset forgets everything but the readers of the demo", async () => {
	const { fake, stripe } = await startFake()
	await stripe.customers.create({ name: "Corner Store" }, { idempotencyKey: "store-1" })
	fake.switch({ slowMs: 5 })
	await post(`${fake.url}/_reset`, {})
	expect((await stripe.customers.list()).data).toEqual([])
	expect((await stripe.events.list()).data).toEqual([])
	expect((await stripe.terminal.readers.list()).data).toHaveLength(2)
	expect(await (await fetch(`${fake.url}/_switches`)).json()).toMatchObject({ slowMs: 0 })
	const other = await stripe.customers.create({ name: "Other Store" }, { idempotencyKey: "store-1" })
	expect(other.name).toBe("Other Store")
})

test("what is kept holds no card number and no security code", async () => {
	const { fake, stripe } = await startFake()
	for (const number of ["4242424242424242", "4000000000009995", "4000002760003184"]) {
		const session = await stripe.checkout.sessions.create(sessionOf(2500))
		await postForm(session.url, { ...card(number), cvc: "987" })
	}
	const text = await (await fetch(`${fake.url}/_state`)).text()
	expect(text).toContain('"last4": "4242"')
	for (const secret of ["4242424242424242", "4000000000009995", "4000002760003184", '"987"', 'cvc":']) {
		expect(text).not.toContain(secret)
	}
})
