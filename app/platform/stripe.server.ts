import Stripe from "stripe"
import { env } from "./env.server"

const TIMEOUT_MS = 10_000
const RETRIES = 2

/**
 * A Stripe client. `apiBase` (an origin such as http://127.0.0.1:3003) points it at another server than Stripe's own.
 * A call gives up after ten seconds and is repeated twice by the client after a lost connection, 409 or 5xx; it is not
 * repeated after 402 or 429. Each repeat carries the same idempotency key, which the caller gives from a row's id,
 * since the one that the client makes up does not outlive the process.
 */
export function createStripe({ secretKey, apiBase }: { secretKey: string; apiBase?: string | undefined }): Stripe {
	const options: Stripe.StripeConfig = { telemetry: false, timeout: TIMEOUT_MS, maxNetworkRetries: RETRIES }
	if (apiBase === undefined) return new Stripe(secretKey, options)
	const base = new URL(apiBase)
	const protocol = base.protocol === "http:" ? "http" : "https"
	const port = base.port || (protocol === "http" ? "80" : "443")
	return new Stripe(secretKey, { ...options, host: base.hostname, port, protocol })
}

let client: Stripe | undefined

/** The client of this process, made from the environment when it is first asked for. Throws EnvironmentError. */
export function stripe(): Stripe {
	client ??= createStripe({ secretKey: env.STRIPE_SECRET_KEY, apiBase: env.STRIPE_API_BASE })
	return client
}

/**
 * The event in `rawBody`, once `signatureHeader` (Stripe-Signature) proves that it was signed with our secret less than
 * five minutes ago. `rawBody` must be the bytes as they came: JSON that was parsed and written anew does not verify.
 * Throws Stripe.errors.StripeSignatureVerificationError otherwise, also when there is no header.
 */
export function verifyStripeEvent(
	rawBody: string,
	signatureHeader: string | null,
	secret: string = env.STRIPE_WEBHOOK_SECRET,
): Stripe.Event {
	return Stripe.webhooks.constructEvent(rawBody, signatureHeader ?? "", secret)
}
