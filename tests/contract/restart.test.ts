import { spawn } from "node:child_process"
import { once } from "node:events"
import { mkdtemp, readFile, rm, writeFile } from "node:fs/promises"
import { tmpdir } from "node:os"
import { join } from "node:path"
import { createInterface } from "node:readline"
import { afterEach, beforeEach, expect, test } from "vitest"
import { createStripe } from "~/platform/stripe.server"
import { startStripeFake } from "../../fakes/stripe/start"
import { card, postForm, SECRET_KEY, sessionOf, startEndpoint, startFake, WEBHOOK_SECRET } from "./harness"

let folder = ""
beforeEach(async () => {
	folder = await mkdtemp(join(tmpdir(), "stripe-fake-"))
})
afterEach(() => rm(folder, { recursive: true, force: true }))

test("payments, keys and open sessions outlive a restart, and an open session moves to the new address", async () => {
	const stateFile = join(folder, "state.json")
	const before = await startStripeFake({ stateFile })
	const client = createStripe({ secretKey: SECRET_KEY, apiBase: before.url })
	const paid = await client.checkout.sessions.create(sessionOf(2500), { idempotencyKey: "invoice-7" })
	await postForm(paid.url, card("4242424242424242"))
	const open = await client.checkout.sessions.create(sessionOf(900))
	await before.close()
	expect(await readFile(stateFile, "utf8")).not.toContain("4242424242424242")

	const { fake, stripe } = await startFake({ stateFile })
	expect(await stripe.checkout.sessions.retrieve(paid.id)).toMatchObject({ payment_status: "paid" })
	const again = await stripe.checkout.sessions.create(sessionOf(2500), { idempotencyKey: "invoice-7" })
	expect(again.id).toBe(paid.id)
	const read = await stripe.checkout.sessions.retrieve(open.id)
	expect(read.url).toBe(`${fake.url}/pay/${open.id}`)
	expect((await postForm(read.url, card("4242424242424242"))).status).toBe(303)
})

test("an event that nobody accepted before a restart is sent after it", async () => {
	const stateFile = join(folder, "state.json")
	const away = { url: "http://127.0.0.1:9/nobody", secret: WEBHOOK_SECRET }
	const before = await startStripeFake({ stateFile, webhook: away })
	await createStripe({ secretKey: SECRET_KEY, apiBase: before.url }).customers.create({ name: "Corner Store" })
	await before.close()

	const endpoint = await startEndpoint()
	const { fake } = await startFake({ stateFile, webhook: { url: endpoint.url, secret: WEBHOOK_SECRET } })
	await fake.idle()
	expect(endpoint.types()).toEqual(["customer.created"])
})

test("a state file that cannot be read stops the start instead of being overwritten", async () => {
	const stateFile = join(folder, "state.json")
	await writeFile(stateFile, "{ half")
	await expect(startStripeFake({ stateFile })).rejects.toThrow(SyntaxError)
	expect(await readFile(stateFile, "utf8")).toBe("{ half")
})

test("the program prints its port, answers, posts to the endpoint it was given, and stops when told", async () => {
	const endpoint = await startEndpoint()
	const program = spawn(process.execPath, ["--import", "tsx", "fakes/stripe/server.ts"], {
		env: { ...process.env, PORT: "0", WEBHOOK_URL: endpoint.url, WEBHOOK_SECRET },
		stdio: ["ignore", "pipe", "inherit"],
	})
	const ended = once(program, "exit")
	try {
		const [line] = await once(createInterface(program.stdout), "line")
		const port = /^listening on (\d+)$/.exec(line)?.[1]
		const stripe = createStripe({ secretKey: SECRET_KEY, apiBase: `http://127.0.0.1:${port}` })
		await stripe.customers.create({ name: "Corner Store" })
		await endpoint.until(1)
		expect(endpoint.types()).toEqual(["customer.created"])
		expect((await fetch(`http://127.0.0.1:${port}/health`)).status).toBe(200)
	} finally {
		program.kill("SIGTERM")
	}
	expect(await ended).toEqual([0, null])
})
