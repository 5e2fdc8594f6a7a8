import type Stripe from "stripe"
import { dollars } from "../amounts"
import { TEST_ROUTING_NUMBER } from "../banks"
import { isByDebit } from "../checkout-payment"
import type { AccountErrors } from "./account-form"
import type { CardErrors, TypedCard } from "./card-form"
import { field } from "./field"
import { escapeHtml, layout } from "./layout"

function linesTable(lines: Stripe.LineItem[]): string {
	const rows = lines.map(
		(line) =>
			`<tr><th scope="row">${escapeHtml(line.description ?? "")}</th><td>${line.quantity ?? 1}</td><td>${dollars(line.amount_total)}</td></tr>`,
	)
	return `<table><thead><tr><th scope="col">What</th><th scope="col">Quantity</th><th scope="col">Amount</th></tr></thead>
<tbody>${rows.join("\n")}</tbody></table>`
}

const testCards = `<details><summary>Test cards</summary>
<table><thead><tr><th scope="col">Number</th><th scope="col">What it does</th></tr></thead><tbody>
<tr><td><code>4242 4242 4242 4242</code></td><td>pays</td></tr>
<tr><td><code>4000 0000 0000 0002</code></td><td>is declined</td></tr>
<tr><td><code>4000 0000 0000 9995</code></td><td>has insufficient funds</td></tr>
<tr><td><code>4000 0027 6000 3184</code></td><td>asks for approval</td></tr>
</tbody></table>
<p>Any expiry in the future, any security code, any name.</p></details>`

const testAccounts = `<details><summary>Test accounts</summary>
<table><thead><tr><th scope="col">Number</th><th scope="col">What it does</th></tr></thead><tbody>
<tr><td><code>000123456789</code></td><td>clears</td></tr>
<tr><td><code>000222222227</code></td><td>is returned: insufficient funds</td></tr>
<tr><td><code>000111111113</code></td><td>is returned: account closed</td></tr>
</tbody></table>
<p>The debit is on its way until the <a href="/bank">bank</a> answers.</p></details>`

function keptForm(method: Stripe.PaymentMethod, total: string): string {
	const { card, us_bank_account: bank } = method
	const words = card ? `card ending in ${card.last4}` : `account ending in ${bank?.last4 ?? ""}`
	return `<form method="post" class="actions"><input type="hidden" name="kept" value="${escapeHtml(method.id)}">
<button type="submit">Pay ${total} with the kept ${words}</button></form>`
}

type Typed = Partial<TypedCard>

function cardFields(typed: Typed | undefined, errors: CardErrors): string {
	return `${field({ name: "number", label: "Card number", hint: "A test card only, such as 4242 4242 4242 4242", value: "", numeric: true }, errors)}
<div class="pair">
${field({ name: "expiry", label: "Expiry", hint: "Month/year", value: typed?.expiry ?? "", numeric: true }, errors)}
${field({ name: "cvc", label: "CVC", hint: "3 or 4 digits", value: "", numeric: true }, errors)}
</div>
${field({ name: "name", label: "Name on card", value: typed?.name ?? "" }, errors)}`
}

function accountFields(typed: Typed | undefined, errors: AccountErrors): string {
	return `${field({ name: "routing", label: "Routing number", hint: `The test bank, ${TEST_ROUTING_NUMBER}`, value: TEST_ROUTING_NUMBER, numeric: true }, errors)}
${field({ name: "account", label: "Account number", hint: "A test account only, such as 000123456789", value: "", numeric: true }, errors)}
${field({ name: "name", label: "Name on account", value: typed?.name ?? "" }, errors)}
<p>By going on you authorize this debit.</p>`
}

function summary(errors: Partial<Record<string, string>>, refusal: string | undefined): string {
	const sentences = Object.entries(errors).map(
		([name, sentence]) => `<li><a href="#${name}">${escapeHtml(sentence ?? "")}</a></li>`,
	)
	if (refusal) return `<div class="alert" role="alert"><p>${escapeHtml(refusal)}</p></div>`
	if (sentences.length === 0) return ""
	return `<div class="alert" role="alert"><p>Please check the form:</p><ul>${sentences.join("")}</ul></div>`
}

/** The hosted page of an open session. Number and security code are never written back into it. */
export function payPage(view: {
	session: Stripe.Checkout.Session
	lines: Stripe.LineItem[]
	email: string | null
	offered: Stripe.PaymentMethod[]
	typed?: Typed
	errors?: CardErrors & AccountErrors
	refusal?: string | undefined
}): string {
	const { session, typed, errors = {} } = view
	const byDebit = isByDebit(session)
	const keeps = session.mode === "setup"
	const total = dollars(session.amount_total ?? 0)
	const what = byDebit ? "bank account" : "card"
	const title = keeps ? `Keep a ${what}` : byDebit ? "Pay from a bank account" : "Pay by card"
	const emailField = view.email
		? `<p>Receipt to ${escapeHtml(view.email)}</p>`
		: field({ name: "email", label: "E-mail", value: typed?.email ?? "" }, errors)
	const back = session.cancel_url ? `<p><a href="${escapeHtml(session.cancel_url)}">Go back without paying</a></p>` : ""
	const sum = `<p class="sum">${total} <span class="hint">${escapeHtml((session.currency ?? "usd").toUpperCase())}</span></p>
${linesTable(view.lines)}`
	return layout(
		keeps ? title : `Pay ${total}`,
		`<h1>${title}</h1>
${keeps ? "<p>Nothing is charged now.</p>" : sum}
${summary(errors, view.refusal)}
${view.offered.map((method) => keptForm(method, total)).join("\n")}
<form method="post" novalidate>
${emailField}
${byDebit ? accountFields(typed, errors) : cardFields(typed, errors)}
<div class="actions"><button type="submit">${keeps ? `Keep this ${what}` : `Pay ${total}`}</button></div>
</form>
${byDebit ? testAccounts : testCards}
${back}`,
	)
}
