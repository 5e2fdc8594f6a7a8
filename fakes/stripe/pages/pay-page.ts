import type Stripe from "stripe"
import { dollars } from "../amounts"
import type { CardErrors, CardField, TypedCard } from "./card-form"
import { escapeHtml, layout } from "./layout"

type FieldSpec = { name: CardField; label: string; hint?: string; value: string; numeric?: boolean }

// autocomplete is off so that no browser offers a real, saved card on a page that must never see one.
function field(spec: FieldSpec, errors: CardErrors): string {
	const { name, label, hint, value } = spec
	const error = errors[name]
	const described = [hint ? `${name}-hint` : "", error ? `${name}-error` : ""].filter(Boolean).join(" ")
	const attributes = [
		`id="${name}"`,
		`name="${name}"`,
		`value="${escapeHtml(value)}"`,
		'autocomplete="off"',
		spec.numeric ? 'inputmode="numeric"' : "",
		name === "email" ? 'type="email"' : 'type="text"',
		described ? `aria-describedby="${described}"` : "",
		error ? 'aria-invalid="true"' : "",
	].filter(Boolean)
	return `<div><label for="${name}">${label}${hint ? ` <span class="hint" id="${name}-hint">${hint}</span>` : ""}</label>
${error ? `<span class="wrong" id="${name}-error">${escapeHtml(error)}</span>` : ""}
<input ${attributes.join(" ")}></div>`
}

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

function summary(errors: CardErrors, refusal: string | undefined): string {
	const sentences = Object.entries(errors).map(
		([name, sentence]) => `<li><a href="#${name}">${escapeHtml(sentence)}</a></li>`,
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
	typed?: TypedCard
	errors?: CardErrors
	refusal?: string | undefined
}): string {
	const { session, typed, errors = {} } = view
	const total = dollars(session.amount_total ?? 0)
	const emailField = view.email
		? `<p>Receipt to ${escapeHtml(view.email)}</p>`
		: field({ name: "email", label: "E-mail", value: typed?.email ?? "" }, errors)
	const back = session.cancel_url ? `<p><a href="${escapeHtml(session.cancel_url)}">Go back without paying</a></p>` : ""
	return layout(
		`Pay ${total}`,
		`<h1>Pay by card</h1>
<p class="sum">${total} <span class="hint">${escapeHtml((session.currency ?? "usd").toUpperCase())}</span></p>
${linesTable(view.lines)}
${summary(errors, view.refusal)}
<form method="post" novalidate>
${emailField}
${field({ name: "number", label: "Card number", hint: "A test card only, such as 4242 4242 4242 4242", value: "", numeric: true }, errors)}
<div class="pair">
${field({ name: "expiry", label: "Expiry", hint: "Month/year", value: typed?.expiry ?? "", numeric: true }, errors)}
${field({ name: "cvc", label: "CVC", hint: "3 or 4 digits", value: "", numeric: true }, errors)}
</div>
${field({ name: "name", label: "Name on card", value: typed?.name ?? "" }, errors)}
<div class="actions"><button type="submit">Pay ${total}</button></div>
</form>
${testCards}
${back}`,
	)
}
