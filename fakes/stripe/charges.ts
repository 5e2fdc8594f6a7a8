import type Stripe from "stripe"
import { z } from "zod"
import { recordBalance } from "./balance"
import type { BankAccount } from "./banks"
import type { Card, CardOutcome } from "./cards"
import { noSuch } from "./errors"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { page } from "./lists"
import { expandable, paging, paramsOf, readParams } from "./params"
import type { Presented } from "./presented"
import type { Endpoints } from "./router"

export type Decline = Extract<CardOutcome, { kind: "decline" }>

function typedCard(card: Card, amount: number): Stripe.Charge.PaymentMethodDetails.Card {
	return {
		amount_authorized: amount,
		authorization_code: null,
		brand: card.brand,
		checks: { address_line1_check: null, address_postal_code_check: null, cvc_check: "pass" },
		country: "US",
		electronic_commerce_indicator: null,
		exp_month: card.expMonth,
		exp_year: card.expYear,
		funding: "credit",
		installments: null,
		last4: card.last4,
		mandate: null,
		network: card.brand,
		network_transaction_id: null,
		regulated_status: "unregulated",
		three_d_secure: null,
		transaction_link_id: null,
		wallet: null,
	}
}

function presentedCard(card: Card, amount: number, reader: string): Stripe.Charge.PaymentMethodDetails.CardPresent {
	return {
		amount_authorized: amount,
		brand: card.brand,
		brand_product: null,
		cardholder_name: null,
		country: "US",
		emv_auth_data: null,
		exp_month: card.expMonth,
		exp_year: card.expYear,
		fingerprint: null,
		funding: "credit",
		generated_card: null,
		incremental_authorization_supported: false,
		last4: card.last4,
		network: card.brand,
		network_transaction_id: null,
		offline: { stored_at: null, type: null },
		overcapture_supported: false,
		preferred_locales: ["en"],
		read_method: "contactless_emv",
		reader,
		receipt: null,
	}
}

function debitedAccount(bank: BankAccount): Stripe.Charge.PaymentMethodDetails.UsBankAccount {
	return {
		account_holder_type: "company",
		account_type: "checking",
		bank_name: bank.bankName,
		fingerprint: null,
		last4: bank.last4,
		payment_reference: null,
		routing_number: bank.routingNumber,
	}
}

function detailsOf(presented: Presented, amount: number): Stripe.Charge.PaymentMethodDetails {
	if ("bank" in presented) return { type: "us_bank_account", us_bank_account: debitedAccount(presented.bank) }
	const { card, reader } = presented
	if (reader === undefined) return { type: "card", card: typedCard(card, amount) }
	return { type: "card_present", card_present: presentedCard(card, amount, reader) }
}

function outcomeOf(decline: Decline | undefined): Stripe.Charge.Outcome {
	return {
		advice_code: null,
		network_advice_code: null,
		network_decline_code: null,
		network_status: decline ? "declined_by_network" : "approved_by_network",
		reason: decline?.declineCode ?? null,
		risk_level: "normal",
		seller_message: decline ? "The bank did not return any further details with this decline." : "Payment complete.",
		type: decline ? "issuer_declined" : "authorized",
	}
}

/**
 * Records one attempt to charge `intent`: succeeded (captured now, or held for capture if the intent says manual), failed
 * when `decline` is given, or pending until the bank has answered when an account is debited. Emits nothing: the caller
 * knows in which order the events belong.
 */
export function recordCharge(
	fake: Fake,
	intent: Stripe.PaymentIntent,
	presented: Presented,
	method: string,
	decline?: Decline,
): Stripe.Charge {
	const captured = !decline && intent.capture_method !== "manual"
	const charge: Stripe.Charge = {
		id: newId("ch"),
		object: "charge",
		amount: intent.amount,
		amount_captured: captured ? intent.amount : 0,
		amount_refunded: 0,
		application: null,
		application_fee: null,
		application_fee_amount: null,
		balance_transaction: null,
		billing_details: { address: null, email: presented.email, name: presented.name, phone: null, tax_id: null },
		calculated_statement_descriptor: "WAXBILL DEMO",
		captured,
		created: fake.seconds(),
		currency: intent.currency,
		customer: intent.customer,
		description: intent.description,
		disputed: false,
		failure_balance_transaction: null,
		failure_code: decline?.code ?? null,
		failure_message: decline?.message ?? null,
		fraud_details: {},
		livemode: false,
		metadata: { ...intent.metadata },
		on_behalf_of: null,
		outcome: outcomeOf(decline),
		paid: !decline,
		payment_intent: intent.id,
		payment_method: method,
		payment_method_details: detailsOf(presented, intent.amount),
		receipt_email: intent.receipt_email,
		receipt_number: null,
		receipt_url: null,
		refunded: false,
		review: null,
		shipping: null,
		source: null,
		source_transfer: null,
		statement_descriptor: null,
		statement_descriptor_suffix: null,
		status: decline ? "failed" : "bank" in presented ? "pending" : "succeeded",
		transfer_data: null,
		transfer_group: null,
	}
	fake.store.charges.set(charge.id, charge)
	if (captured && charge.status === "succeeded") recordBalance(fake, charge)
	return charge
}

/** The charge named `id`; refuses with 404 `resource_missing`. */
export function getCharge(fake: Fake, id: string, param?: string): Stripe.Charge {
	const charge = fake.store.charges.get(id)
	if (!charge) throw noSuch("charge", id, param)
	return charge
}

const listSchema = paramsOf<Stripe.ChargeListParams>()({
	...paging,
	payment_intent: z.string().optional(),
	customer: z.string().optional(),
})

export const chargeEndpoints: Endpoints = {
	"GET /v1/charges": ({ fake, form }) => {
		const { payment_intent, customer, ...rest } = readParams(listSchema, form)
		const rows = [...fake.store.charges.values()].filter(
			(row) =>
				(payment_intent === undefined || row.payment_intent === payment_intent) &&
				(customer === undefined || row.customer === customer),
		)
		return page(rows, "/v1/charges", rest)
	},
	"GET /v1/charges/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		return getCharge(fake, id)
	},
}
