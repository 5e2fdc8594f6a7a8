import { randomUUID } from "node:crypto"
import { and, eq, isNull } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { auditEntries, deliveryRounds, memberships, priceTiers, producerSettings, producers } from "~/db/schema"
import { readPerson, withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"

/**
 * Opens a desk for a new producer: its name and address in the URL, its settings, one price tier and one weekly round to
 * begin with, and the person as its owner. Refuses a name in the URL that another producer has; sent again by its owner,
 * it is the desk that is there.
 */
export async function openDesk(desk: {
	person: { id: string; name: string; email: string }
	name: string
	slug: string
	county: string
	timeZone: string
}): Promise<Result<{ slug: string }, { ok: false; reason: "slug-taken" }>> {
	const producerId = randomUUID()
	try {
		await withProducer(producerId, async (tx) => {
			await tx.insert(producers).values({
				id: producerId,
				slug: desk.slug,
				name: desk.name,
				county: desk.county,
				timeZone: desk.timeZone,
			})
			await tx
				.insert(producerSettings)
				.values({ producerId, address: desk.county, email: desk.person.email, contactName: desk.person.name })
			await tx.insert(priceTiers).values({ producerId, name: "Stores" })
			await tx
				.insert(deliveryRounds)
				.values({ producerId, name: "Tuesday", weekday: 2, cutoffDaysBefore: 4, cutoffTime: "12:00" })
			const [owner] = await tx
				.insert(memberships)
				.values({ producerId, userId: desk.person.id, role: "owner" })
				.returning({ id: memberships.id })
			if (!owner) throw new Error("an insert returns its row")
			await tx.insert(auditEntries).values({
				producerId,
				userId: desk.person.id,
				action: "desk opened",
				subjectType: "membership",
				subjectId: owner.id,
			})
		})
	} catch (error) {
		if (!breaksConstraint(error, "producers_slug_once")) throw error
		if (!(await isOwnDesk(desk))) return { ok: false, reason: "slug-taken" }
	}
	return { ok: true, slug: desk.slug }
}

/** Whether the producer of this name in the URL is the person's own, under the same name. */
async function isOwnDesk(desk: { person: { id: string }; slug: string; name: string }): Promise<boolean> {
	const found = await readPerson(desk.person.id, (tx) =>
		tx
			.select({ id: producers.id })
			.from(producers)
			.innerJoin(memberships, eq(memberships.producerId, producers.id))
			.where(
				and(
					eq(producers.slug, desk.slug),
					eq(producers.name, desk.name),
					eq(memberships.userId, desk.person.id),
					eq(memberships.role, "owner"),
					isNull(memberships.endedAt),
				),
			),
	)
	return found.length > 0
}
