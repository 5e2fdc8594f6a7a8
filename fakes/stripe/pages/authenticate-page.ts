import type Stripe from "stripe"
import { dollars } from "../amounts"
import { layout } from "./layout"

/** Where the holder of a card that wants authentication approves or refuses the payment. */
export function authenticatePage(intent: Stripe.PaymentIntent): string {
	return layout(
		"Approve this payment?",
		`<h1>Approve this payment?</h1>
<p>The bank of this test card asks whether you want to pay <strong>${dollars(intent.amount)}</strong>.</p>
<form method="post" class="actions">
<button type="submit" name="answer" value="approve">Approve</button>
<button type="submit" name="answer" value="refuse" class="plain">Refuse</button>
</form>`,
	)
}
