import type { IncomingMessage, ServerResponse } from "node:http"
import { z } from "zod"
import { getCharge } from "./charges"
import { settleDebit } from "./debits"
import { closeDispute, getDispute, openDispute } from "./disputes"
import type { Fake } from "./fake"
import { readBody, sendJson } from "./http"
import { getIntent } from "./payment-intents"
import { makePayout } from "./payouts"
import { getRefund, settleRefund } from "./refunds"
import { dumpStore, resetStore } from "./store"
import { setSwitches, switchesOff } from "./switches"
import type { Courier } from "./webhooks"

const flushSchema = z.strictObject({ order: z.enum(["created", "reverse"]).default("created") })

/** What a bank does on its own, by name; the page /bank and the path POST /_bank lead here. */
const bankSteps = z.discriminatedUnion("step", [
	z.strictObject({
		step: z.literal("settle-debit"),
		intent: z.string(),
		outcome: z.enum(["clear", "return"]).optional(),
	}),
	z.strictObject({
		step: z.literal("open-dispute"),
		charge: z.string(),
		reason: z.string().default("product_not_received"),
	}),
	z.strictObject({ step: z.literal("close-dispute"), dispute: z.string(), outcome: z.enum(["won", "lost"]) }),
	z.strictObject({ step: z.literal("settle-refund"), refund: z.string(), outcome: z.enum(["succeeded", "failed"]) }),
	z.strictObject({ step: z.literal("pay-out") }),
])
export type BankStep = z.input<typeof bankSteps>

/** Does one of the bank's steps; refuses as the parts do, and a step that there is not. */
export function takeBankStep(fake: Fake, asked: unknown): void {
	const step = bankSteps.parse(asked)
	if (step.step === "settle-debit") settleDebit(fake, getIntent(fake, step.intent), step.outcome)
	else if (step.step === "open-dispute") openDispute(fake, getCharge(fake, step.charge), step.reason)
	else if (step.step === "close-dispute") closeDispute(fake, getDispute(fake, step.dispute), step.outcome)
	else if (step.step === "settle-refund") settleRefund(fake, getRefund(fake, step.refund), step.outcome)
	else makePayout(fake)
}

/** Turns switches on or off; events that were held are let go when holding ends. */
export function changeSwitches(fake: Fake, courier: Courier, changes: unknown): void {
	setSwitches(fake.switches, changes)
	if (!fake.switches.holdEvents) void courier.flush("created")
}

/** Forgets all payments, events, answers and switches; the readers of the demo are there again. */
export function resetFake(fake: Fake, courier: Courier): void {
	courier.drop()
	resetStore(fake.store)
	Object.assign(fake.switches, switchesOff())
}

/**
 * The paths for tests and people who try things out: GET and POST /_switches, POST /_bank (what a bank does: settle a
 * debit, dispute, pay out), POST /_reset, POST /_events/flush, GET /_state, and GET /health for whoever waits for the fake to be there. Answers false when the path is none of these.
 */
export function createControl(fake: Fake, courier: Courier, saved: () => void) {
	const routes: Record<string, (body: unknown) => unknown> = {
		"GET /health": () => ({ status: "ok" }),
		"GET /_switches": () => fake.switches,
		"POST /_switches": (body) => {
			changeSwitches(fake, courier, body)
			return fake.switches
		},
		"POST /_bank": (body) => {
			takeBankStep(fake, body)
			saved()
			return { done: true }
		},
		"POST /_reset": () => {
			resetFake(fake, courier)
			saved()
			return { reset: true }
		},
		"POST /_events/flush": async (body) => {
			await courier.flush(flushSchema.parse(body).order)
			return { flushed: true }
		},
		"GET /_state": () => ({ ...dumpStore(fake.store), deliveries: fake.store.deliveries }),
	}
	return async (request: IncomingMessage, response: ServerResponse, path: string): Promise<boolean> => {
		const handle = routes[`${request.method} ${path}`]
		if (!handle) return false
		try {
			const text = request.method === "POST" ? await readBody(request) : ""
			sendJson(response, 200, JSON.stringify(await handle(text ? JSON.parse(text) : {}), null, 2))
		} catch (error) {
			sendJson(response, 400, JSON.stringify({ error: { message: String(error) } }))
		}
		return true
	}
}
