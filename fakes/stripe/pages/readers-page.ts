import type Stripe from "stripe"
import { dollars } from "../amounts"
import type { Fake } from "../fake"
import { escapeHtml, layout } from "./layout"

/** The cards a person can hold to a reader, by the word that the button sends. */
export const presentable: Record<string, string> = {
	good: "4242424242424242",
	declined: "4000000000000002",
	insufficient: "4000000000009995",
}

function amountWaiting(fake: Fake, reader: Stripe.Terminal.Reader): string {
	const intent = fake.store.intents.get(String(reader.action?.process_payment_intent?.payment_intent))
	return intent ? dollars(intent.amount) : ""
}

function readerState(fake: Fake, reader: Stripe.Terminal.Reader): string {
	const amount = amountWaiting(fake, reader)
	switch (reader.action?.status) {
		case "in_progress":
			return `<p><strong>Waits for a card: ${amount}</strong></p>
<form method="post" action="/readers/${escapeHtml(reader.id)}/present" class="actions">
<button type="submit" name="card" value="good">Present a good card</button>
<button type="submit" name="card" value="declined" class="plain">Present a declined card</button>
<button type="submit" name="card" value="insufficient" class="plain">Present a card without funds</button>
</form>`
		case "succeeded":
			return `<p>Last payment: ${amount}, approved.</p>`
		case "failed":
			return `<p>Last payment: ${amount}, declined. ${escapeHtml(reader.action.failure_message ?? "")}</p>`
		default:
			return "<p>Ready. Nothing to pay.</p>"
	}
}

/** All readers, with buttons that stand for holding a card to the one that waits. */
export function readersPage(fake: Fake): string {
	const parts = [...fake.store.readers.values()].map(
		(reader) => `<section class="reader" aria-labelledby="${escapeHtml(reader.id)}">
<h2 id="${escapeHtml(reader.id)}">${escapeHtml(reader.label)}</h2>
${readerState(fake, reader)}
</section>`,
	)
	return layout(
		"Card readers",
		`<h1>Card readers</h1>
<p>Stands for the readers on the stall table. Send a payment to one, then <a href="/readers">look again</a>.</p>
${parts.join("\n")}`,
	)
}
