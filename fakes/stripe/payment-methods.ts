import type Stripe from "stripe"
import { z } from "zod"
import type { BankAccount } from "./banks"
import type { Card } from "./cards"
import { invalidRequest, noSuch } from "./errors"
import type { Cause } from "./events"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { page } from "./lists"
import { expandable, paging, readParams } from "./params"
import type { Presented } from "./presented"
import type { Endpoints } from "./router"
import type { Behaviour } from "./store"

function cardPart(card: Card): Stripe.PaymentMethod.Card {
	return {
		brand: card.brand,
		checks: { address_line1_check: null, address_postal_code_check: null, cvc_check: "pass" },
		country: "US",
		display_brand: card.brand,
		exp_month: card.expMonth,
		exp_year: card.expYear,
		fingerprint: null,
		funding: "credit",
		generated_from: null,
		last4: card.last4,
		networks: { available: [card.brand], preferred: null },
		regulated_status: "unregulated",
		three_d_secure_usage: { supported: true },
		wallet: null,
	}
}

function bankPart(bank: BankAccount): Stripe.PaymentMethod.UsBankAccount {
	return {
		account_holder_type: "company",
		account_type: "checking",
		bank_name: bank.bankName,
		financial_connections_account: null,
		fingerprint: null,
		last4: bank.last4,
		networks: { preferred: "ach", supported: ["ach"] },
		routing_number: bank.routingNumber,
		status_details: null,
	}
}

/** Records a card or an account that was typed on a page, with what will come of charging it; answers its id. */
export function recordMethod(fake: Fake, presented: Presented, behaviour: Behaviour): string {
	const part =
		"bank" in presented
			? { type: "us_bank_account" as const, us_bank_account: bankPart(presented.bank) }
			: { type: "card" as const, card: cardPart(presented.card) }
	const method: Stripe.PaymentMethod = {
		id: newId("pm"),
		object: "payment_method",
		allow_redisplay: "unspecified",
		billing_details: { address: null, email: presented.email, name: presented.name, phone: null, tax_id: null },
		created: fake.seconds(),
		customer: null,
		customer_account: null,
		livemode: false,
		metadata: {},
		...part,
	}
	fake.store.methods.set(method.id, method)
	fake.store.behaviours.set(method.id, behaviour)
	return method.id
}

/** The method named `id`; refuses with 404 `resource_missing`. */
function getMethod(fake: Fake, id: string, param?: string): Stripe.PaymentMethod {
	const method = fake.store.methods.get(id)
	if (!method) throw noSuch("PaymentMethod", id, param)
	return method
}

/** Keeps a method for a customer, with the event payment_method.attached; nothing when it is kept already. */
export function attachMethod(fake: Fake, id: string, customer: string, cause: Cause): void {
	const method = getMethod(fake, id)
	if (method.customer === customer) return
	method.customer = customer
	fake.events.emit("payment_method.attached", method, cause)
}

/** What was kept of a method, as it is charged again. Refuses one that is not kept for this customer. */
export function keptMethod(
	fake: Fake,
	id: string,
	customer: string | null,
): { presented: Presented; behaviour: Behaviour } {
	const method = getMethod(fake, id, "payment_method")
	const behaviour = fake.store.behaviours.get(id)
	if (!method.customer || !behaviour) {
		throw invalidRequest(
			"The provided PaymentMethod was previously used with a PaymentIntent without Customer attachment, shared with a connected account without Customer attachment, or was detached from a Customer. It may not be used again.",
			{ param: "payment_method" },
		)
	}
	if (method.customer !== customer) {
		throw invalidRequest(
			"The payment method you provided is attached to a customer so for security purposes you must provide the customer in the request.",
			{ param: "customer" },
		)
	}
	const { name, email } = method.billing_details
	const { card, us_bank_account: bank } = method
	if (card) {
		const { brand, last4, exp_month: expMonth, exp_year: expYear } = card
		return { presented: { name, email, card: { brand, last4, expMonth, expYear } }, behaviour }
	}
	const account = {
		bankName: bank?.bank_name ?? "",
		last4: bank?.last4 ?? "",
		routingNumber: bank?.routing_number ?? "",
	}
	return { presented: { name, email, bank: account }, behaviour }
}

export const paymentMethodEndpoints: Endpoints = {
	"GET /v1/payment_methods/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		return getMethod(fake, id)
	},
	"POST /v1/payment_methods/:id/detach": ({ fake, form, id, cause }) => {
		readParams(z.strictObject(expandable), form)
		const method = getMethod(fake, id)
		if (!method.customer) {
			throw invalidRequest("The payment method you provided is not attached to a customer so detachment is impossible.")
		}
		method.customer = null
		fake.events.emit("payment_method.detached", method, cause)
		return method
	},
	"GET /v1/customers/:id/payment_methods": ({ fake, form, id }) => {
		const given = readParams(z.strictObject(paging), form)
		const rows = [...fake.store.methods.values()].filter((row) => row.customer === id)
		return page(rows, `/v1/customers/${id}/payment_methods`, given)
	},
}
