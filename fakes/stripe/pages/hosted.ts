import type { IncomingMessage, ServerResponse } from "node:http"
import type Stripe from "stripe"
import {
	answerAuthentication,
	debitSession,
	isByDebit,
	keepAccount,
	keepCard,
	knownEmail,
	offeredMethods,
	paySession,
	payWithKept,
} from "../checkout-payment"
import { takeBankStep } from "../control"
import { StripeRefusal } from "../errors"
import { fromPage } from "../events"
import type { Fake } from "../fake"
import { type FormTree, parseForm } from "../form"
import { readBody, redirect, sendPage } from "../http"
import { presentCard } from "../readers"
import { readAccountForm } from "./account-form"
import { authenticatePage } from "./authenticate-page"
import { bankPage } from "./bank-page"
import { readCardForm } from "./card-form"
import { messagePage } from "./layout"
import { payPage } from "./pay-page"
import { presentable, readersPage } from "./readers-page"

type Visit = { fake: Fake; id: string; form: FormTree; query: URLSearchParams }
type Reply = { status: number; html: string } | { to: string }

const nothing: Reply = { status: 404, html: messagePage("Not found", "There is nothing to pay here.") }

function successUrl(session: Stripe.Checkout.Session): string {
	return (session.success_url ?? "/").replaceAll("{CHECKOUT_SESSION_ID}", session.id)
}

function closed(session: Stripe.Checkout.Session): Reply {
	if (session.status === "complete") {
		const on = { href: successUrl(session), text: "Go on" }
		return { status: 200, html: messagePage("Already paid", "This payment has been made.", on) }
	}
	const back = session.cancel_url ? { href: session.cancel_url, text: "Go back" } : undefined
	return { status: 410, html: messagePage("Expired", "The time for this payment is over. Nothing was charged.", back) }
}

function showPay({ fake, id, query }: Visit): Reply {
	const session = fake.store.sessions.get(id)
	if (!session) return nothing
	if (session.status !== "open") return closed(session)
	const lines = fake.store.sessionSecrets.get(id)?.lines ?? []
	const intent = fake.store.intents.get(String(session.payment_intent))
	const refusal = query.has("refused") ? intent?.last_payment_error?.message : undefined
	return {
		status: 200,
		html: payPage({
			session,
			lines,
			email: knownEmail(fake, session),
			offered: offeredMethods(fake, session),
			refusal,
		}),
	}
}

function submitPay({ fake, id, form }: Visit): Reply {
	const session = fake.store.sessions.get(id)
	if (!session) return nothing
	// A double click on Pay: the second post finds the session paid and goes where the first one went.
	if (session.status === "complete") return { to: successUrl(session) }
	if (session.status !== "open") return closed(session)
	const lines = fake.store.sessionSecrets.get(id)?.lines ?? []
	const email = knownEmail(fake, session)
	const offered = offeredMethods(fake, session)
	const kept = offered.find(({ id }) => id === form.kept)
	if (kept) {
		const result = payWithKept(fake, session, kept.id)
		if (result.kind === "paid") return { to: successUrl(session) }
		if (result.kind === "authenticate") return { to: result.url }
		return { status: 402, html: payPage({ session, lines, email, offered, refusal: result.message }) }
	}
	if (isByDebit(session)) {
		const { typed, errors, account } = readAccountForm(form, email === null)
		if (!account) return { status: 422, html: payPage({ session, lines, email, offered, typed, errors }) }
		const take = session.mode === "setup" ? keepAccount : debitSession
		take(fake, session, { ...account, email: email ?? typed.email })
		return { to: successUrl(session) }
	}
	const { typed, errors, card } = readCardForm(form, email === null, fake.seconds())
	if (!card) return { status: 422, html: payPage({ session, lines, email, offered, typed, errors }) }
	if (session.mode === "setup") {
		keepCard(fake, session, { ...card, email: email ?? typed.email })
		return { to: successUrl(session) }
	}
	const result = paySession(fake, session, { ...card, email: email ?? typed.email })
	if (result.kind === "paid") return { to: successUrl(session) }
	if (result.kind === "authenticate") return { to: result.url }
	return { status: 402, html: payPage({ session, lines, email, offered, typed, refusal: result.message }) }
}

function waitingIntent(fake: Fake, id: string): Stripe.PaymentIntent | undefined {
	const intent = fake.store.intents.get(id)
	return intent?.status === "requires_action" ? intent : undefined
}

function showAuthenticate({ fake, id }: Visit): Reply {
	const intent = waitingIntent(fake, id)
	return intent ? { status: 200, html: authenticatePage(intent) } : nothing
}

function submitAuthenticate({ fake, id, form }: Visit): Reply {
	const intent = waitingIntent(fake, id)
	if (!intent || (form.answer !== "approve" && form.answer !== "refuse")) return nothing
	const returnUrl = intent.next_action?.redirect_to_url?.return_url
	const session = answerAuthentication(fake, intent, form.answer === "approve")
	if (session) return { to: session.status === "complete" ? successUrl(session) : `/pay/${session.id}?refused` }
	if (returnUrl) return { to: returnUrl }
	return { status: 200, html: messagePage("Thank you", "Your answer was noted. You can close this page.") }
}

function submitPresent({ fake, id, form }: Visit): Reply {
	const reader = fake.store.readers.get(id)
	const number = presentable[String(form.card)]
	if (!reader || !number) return nothing
	presentCard(fake, reader, number, fromPage)
	return { to: "/readers" }
}

function submitBank({ fake, form }: Visit): Reply {
	takeBankStep(fake, { ...form })
	return { to: "/bank" }
}

const routes: { method: string; pattern: RegExp; handle: (visit: Visit) => Reply }[] = [
	{ method: "GET", pattern: /^\/$/, handle: () => ({ to: "/readers" }) },
	{ method: "GET", pattern: /^\/pay\/(\w+)$/, handle: showPay },
	{ method: "POST", pattern: /^\/pay\/(\w+)$/, handle: submitPay },
	{ method: "GET", pattern: /^\/authenticate\/(\w+)$/, handle: showAuthenticate },
	{ method: "POST", pattern: /^\/authenticate\/(\w+)$/, handle: submitAuthenticate },
	{ method: "GET", pattern: /^\/readers$/, handle: ({ fake }) => ({ status: 200, html: readersPage(fake) }) },
	{ method: "GET", pattern: /^\/bank$/, handle: ({ fake }) => ({ status: 200, html: bankPage(fake) }) },
	{ method: "POST", pattern: /^\/bank$/, handle: submitBank },
	{ method: "POST", pattern: /^\/readers\/(\w+)\/present$/, handle: submitPresent },
]

function reply(visit: Omit<Visit, "id">, method: string, path: string): Reply {
	const route = routes.find((one) => one.method === method && one.pattern.test(path))
	if (!route) return nothing
	try {
		return route.handle({ ...visit, id: route.pattern.exec(path)?.[1] ?? "" })
	} catch (error) {
		if (!(error instanceof StripeRefusal)) throw error
		const link = { href: "/readers", text: "Card readers" }
		return { status: error.status, html: messagePage("That did not work", error.message, link) }
	}
}

/** Answers the pages for people: paying a session, authenticating a card, presenting a card to a reader. */
export function createPages(fake: Fake, saved: () => void) {
	return async (request: IncomingMessage, response: ServerResponse, url: URL): Promise<void> => {
		const method = request.method ?? "GET"
		const form = method === "POST" ? parseForm(await readBody(request)) : {}
		const answer = reply({ fake, form, query: url.searchParams }, method, url.pathname)
		if (method === "POST") saved()
		if ("to" in answer) redirect(response, answer.to)
		else sendPage(response, answer.status, answer.html)
	}
}
