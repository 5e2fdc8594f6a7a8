import { admits, guard } from "~/routes/guard.server"
import { receiveStripeEvent } from "~/services/payments/receive-stripe-event.server"
import type { Route } from "./+types/stripe"

/** Nothing to see here for a browser. */
export const loader = guard(admits.anyone, () => new Response(null, { status: 405, headers: { Allow: "POST" } }))

/** Takes in an event. The body is read raw: the signature is over its exact bytes. */
export const action = guard(admits.signer, async ({ request }: Route.ActionArgs) => {
	const isTaken = await receiveStripeEvent(await request.text(), request.headers.get("stripe-signature"))
	return new Response(null, { status: isTaken ? 200 : 400 })
})
