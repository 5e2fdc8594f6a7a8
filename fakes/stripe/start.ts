import { createServer } from "node:http"
import type { AddressInfo } from "node:net"
import { createApi } from "./api"
import { expireDue, payUrl } from "./checkout-sessions"
import { type BankStep, changeSwitches, createControl, resetFake, takeBankStep } from "./control"
import { createEventLog } from "./events"
import type { Fake } from "./fake"
import { createPages } from "./pages/hosted"
import { readStateFile, writeStateFile } from "./state-file"
import { createStore, type Store } from "./store"
import { type SwitchChanges, switchesOff } from "./switches"
import { createCourier } from "./webhooks"

export type StripeFakeOptions = {
	/** 0 or unset takes a free port. */
	port?: number
	/** Where events are posted, and the secret they are signed with. Without it they are only recorded. */
	webhook?: { url: string; secret: string }
	/** Keeps what happened over a restart. */
	stateFile?: string
	/** The address people's browsers use, when it is not http://127.0.0.1:port. */
	publicUrl?: string
	/** The clock in milliseconds. */
	now?: () => number
	/** How long a refused event waits before it is sent again: doubling from `firstMs` up to `longestMs`. */
	retry?: { firstMs?: number; longestMs?: number; tries?: number }
}

export type StripeFake = {
	url: string
	port: number
	/** What the fake remembers; for looking, not for writing. */
	state: Store
	/** Turns switches on or off, as POST /_switches does. */
	switch: (changes: SwitchChanges) => void
	/** Has a bank do something, as POST /_bank does. */
	bank: (step: BankStep) => void
	/** Lets held events go and waits until each was tried once. */
	flushEvents: (order: "created" | "reverse") => Promise<void>
	/** Resolves when every event that is not held has been tried once. */
	idle: () => Promise<void>
	reset: () => void
	close: () => Promise<void>
}

/**
 * Starts the payment fake on 127.0.0.1. It speaks Stripe's API to the stripe package (host, port, protocol http),
 * serves the hosted payment page and the readers' page to people, and posts signed events. Rejects when the port is
 * taken or the state file cannot be read.
 */
export async function startStripeFake(options: StripeFakeOptions = {}): Promise<StripeFake> {
	const clock = options.now ?? Date.now
	const seconds = () => Math.floor(clock() / 1000)
	const store = createStore()
	if (options.stateFile) readStateFile(options.stateFile, store)
	const saved = () => {
		if (options.stateFile) writeStateFile(options.stateFile, store)
	}
	const switches = switchesOff()
	const pause = { firstMs: 1000, longestMs: 60_000, tries: 40, ...options.retry }
	const courier = createCourier(store, switches, options.webhook, pause, saved)
	const events = createEventLog(store, seconds, courier.deliver, options.webhook !== undefined)
	const fake: Fake = { store, switches, events, url: "", seconds }
	const answerApi = createApi(fake, clock, saved)
	const answerControl = createControl(fake, courier, saved)
	const answerPage = createPages(fake, saved)

	const server = createServer(async (request, response) => {
		try {
			expireDue(fake)
			const url = new URL(request.url ?? "/", "http://fake.invalid")
			if (url.pathname.startsWith("/v1/")) await answerApi(request, response)
			else if (!(await answerControl(request, response, url.pathname))) await answerPage(request, response, url)
		} catch (error) {
			console.error(error)
			if (!response.headersSent) response.writeHead(500)
			response.end()
		}
	})
	await new Promise<void>((resolve, reject) => {
		server.once("error", reject)
		server.listen(options.port ?? 0, "127.0.0.1", resolve)
	})
	const { port } = server.address() as AddressInfo
	fake.url = options.publicUrl ?? `http://127.0.0.1:${port}`
	// The port may be another one than before a restart.
	for (const session of store.sessions.values()) if (session.url !== null) session.url = payUrl(fake, session.id)
	const sweep = setInterval(() => expireDue(fake), 5000).unref()
	// What had not been accepted before a restart is sent again.
	for (const event of store.events.values()) if (event.pending_webhooks > 0) courier.deliver(event)

	return {
		url: fake.url,
		port,
		state: store,
		switch: (changes) => changeSwitches(fake, courier, changes),
		bank: (step) => takeBankStep(fake, step),
		flushEvents: courier.flush,
		idle: courier.idle,
		reset: () => resetFake(fake, courier),
		close: () => {
			clearInterval(sweep)
			courier.stop()
			return new Promise((resolve) => {
				server.close(() => resolve())
				server.closeAllConnections()
			})
		},
	}
}
