import { eq, sql } from "drizzle-orm"
import { z } from "zod"
import { stripeEvents } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"
import { bringIntent, bringSession } from "./bring-from-stripe.server"
import { fillPayout } from "./fill-payout.server"

const idOrObject = z.union([z.string(), z.object({ id: z.string() }).transform(({ id }) => id), z.null()]).optional()

const subject = z.object({
	data: z.object({
		object: z.object({ id: z.string(), object: z.string(), payment_intent: idOrObject }),
	}),
})

/**
 * Applies a stored event once. The event is a hint only: what counts is what Stripe says now of the payment, visit or
 * payout that it is about, so that events may come twice and in any order, and one that is applied again after a crash
 * changes nothing more. Events of other kinds, or about what is not ours, are marked and left. Throws when Stripe does not
 * answer: tried again later.
 */
export async function applyStripeEvent({ eventId }: { eventId: string }): Promise<void> {
	const event = await withPlatform(async (tx) => {
		const [row] = await tx.select().from(stripeEvents).where(eq(stripeEvents.id, eventId))
		return row
	})
	if (!event || event.appliedAt) return
	const about = subject.safeParse(event.payload).data?.data.object
	if (about) await bring(about)
	await withPlatform((tx) => tx.update(stripeEvents).set({ appliedAt: sql`now()` }).where(eq(stripeEvents.id, eventId)))
}

async function bring(about: { id: string; object: string; payment_intent?: string | null | undefined }): Promise<void> {
	switch (about.object) {
		case "payment_intent":
			return bringIntent(about.id)
		case "checkout.session":
			return about.payment_intent ? bringIntent(about.payment_intent) : bringSession(about.id)
		case "charge":
		case "refund":
		case "dispute":
			return about.payment_intent ? bringIntent(about.payment_intent) : undefined
		case "payout":
			return fillPayout(about.id)
	}
}
