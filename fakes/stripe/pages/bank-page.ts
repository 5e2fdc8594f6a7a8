import type Stripe from "stripe"
import { dollars } from "../amounts"
import type { BankStep } from "../control"
import type { Fake } from "../fake"
import { escapeHtml, layout } from "./layout"

const SHOWN = 20

function button(step: BankStep, words: string): string {
	const fields = Object.entries(step).map(
		([name, value]) => `<input type="hidden" name="${name}" value="${escapeHtml(value)}">`,
	)
	return `<form method="post">${fields.join("")}<button type="submit" class="plain">${words}</button></form>`
}

function rows(caption: string, list: { words: string; buttons: string[] }[]): string {
	if (list.length === 0) return `<h2>${caption}</h2>\n<p>None.</p>`
	const body = list.map(
		({ words, buttons }) =>
			`<tr><th scope="row">${escapeHtml(words)}</th><td><div class="actions">${buttons.join("")}</div></td></tr>`,
	)
	return `<h2>${caption}</h2>\n<table><tbody>${body.join("\n")}</tbody></table>`
}

function latest<T>(table: Map<string, T>, wanted: (row: T) => boolean): T[] {
	return [...table.values()].filter(wanted).reverse().slice(0, SHOWN)
}

const chargeWords = (charge: Stripe.Charge) =>
	`${dollars(charge.amount)}, ${charge.payment_method_details?.type === "us_bank_account" ? "debit" : "card"}, ${charge.description ?? charge.id}`

/** The bank of the test accounts: lets debits clear or returns them, disputes charges and decides, pays out. */
export function bankPage(fake: Fake): string {
	const { charges, disputes, intents, refunds } = fake.store
	const debits = latest(intents, ({ status }) => status === "processing").map((intent) => ({
		words: `${dollars(intent.amount)}, ${intent.description ?? intent.id}`,
		buttons: [
			button({ step: "settle-debit", intent: intent.id, outcome: "clear" }, "Let it clear"),
			button({ step: "settle-debit", intent: intent.id, outcome: "return" }, "Return it"),
		],
	}))
	const paid = latest(charges, (charge) => charge.status === "succeeded" && !charge.disputed).map((charge) => ({
		words: chargeWords(charge),
		buttons: [button({ step: "open-dispute", charge: charge.id }, "Dispute it")],
	}))
	const disputed = latest(disputes, ({ status }) => status === "needs_response").map((dispute) => ({
		words: dollars(dispute.amount),
		buttons: [
			button({ step: "close-dispute", dispute: dispute.id, outcome: "won" }, "The producer wins"),
			button({ step: "close-dispute", dispute: dispute.id, outcome: "lost" }, "The producer loses"),
		],
	}))
	const refunded = latest(refunds, ({ status }) => status !== "failed").map((refund) => ({
		words: `${dollars(refund.amount)}, ${refund.status}`,
		buttons: [
			...(refund.status === "pending"
				? [button({ step: "settle-refund", refund: refund.id, outcome: "succeeded" }, "Let it arrive")]
				: []),
			button({ step: "settle-refund", refund: refund.id, outcome: "failed" }, "Let it fail"),
		],
	}))
	return layout(
		"The bank",
		`<h1>The bank</h1>
<p>Stands for the payers' banks, which answer in their own time. <a href="/bank">Look again</a>.</p>
${rows("Debits on their way", debits)}
${rows("Disputes to be decided", disputed)}
${rows("Refunds", refunded)}
${rows("Charges", paid)}
<h2>Payout</h2>
${button({ step: "pay-out" }, "Pay out what has come in")}`,
	)
}
