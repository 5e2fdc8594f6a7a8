import { expect, test } from "vitest"
import { refusal, startFake } from "./harness"

test("a customer is created, read and changed; an empty value takes a metadata key or a field away", async () => {
	const { stripe } = await startFake()
	const made = await stripe.customers.create({
		name: "Corner Store",
		email: "books@corner.example.test",
		address: { line1: "1 Mill Lane", city: "Ashby", state: "VT", postal_code: "05001", country: "US" },
		metadata: { store: "12", tier: "a" },
	})
	expect(made).toMatchObject({ object: "customer", livemode: false, metadata: { store: "12", tier: "a" } })

	await stripe.customers.update(made.id, {
		email: "",
		metadata: { tier: "", route: "north" },
		address: { city: "Orby" },
	})
	const read = await stripe.customers.retrieve(made.id)
	expect(read).toMatchObject({ name: "Corner Store", email: null, metadata: { store: "12", route: "north" } })
	expect(read).toMatchObject({ address: { line1: "1 Mill Lane", city: "Orby" } })
	expect(read).not.toHaveProperty("metadata.tier")
})

test("metadata that Stripe would not take is refused", async () => {
	const { stripe } = await startFake()
	const call = stripe.customers.create({ metadata: { note: "x".repeat(501) } })
	expect(await refusal(call)).toMatchObject({ statusCode: 400 })
})

test("a list is paged newest first, and auto-paging walks it all", async () => {
	const { stripe } = await startFake()
	for (let n = 1; n <= 7; n += 1) await stripe.customers.create({ name: `Store ${n}` })
	const first = await stripe.customers.list({ limit: 3 })
	expect(first.data.map((row) => row.name)).toEqual(["Store 7", "Store 6", "Store 5"])
	expect(first.has_more).toBe(true)

	const names: unknown[] = []
	for await (const row of stripe.customers.list({ limit: 3 })) names.push(row.name)
	expect(names).toEqual(["Store 7", "Store 6", "Store 5", "Store 4", "Store 3", "Store 2", "Store 1"])

	const last = first.data[2]?.id ?? ""
	const before = await stripe.customers.list({ limit: 1, ending_before: last })
	expect(before.data.map((row) => row.name)).toEqual(["Store 6"])
	expect(before.has_more).toBe(true)
})

test("a list is filtered by address and by time, and refuses a limit over 100", async () => {
	const { stripe } = await startFake()
	const made = await stripe.customers.create({ email: "a@corner.example.test" })
	await stripe.customers.create({ email: "b@corner.example.test" })
	const found = await stripe.customers.list({ email: "a@corner.example.test" })
	expect(found.data.map((row) => row.id)).toEqual([made.id])
	expect((await stripe.customers.list({ created: { gt: made.created + 60 } })).data).toEqual([])
	expect(await refusal(stripe.customers.list({ limit: 101 }))).toMatchObject({ param: "limit" })
})
