import { and, eq, isNull } from "drizzle-orm"
import { memberships, priceTiers, stores, users } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Round } from "~/domain/delivery/delivery-days"
import type { Terms } from "~/domain/invoicing/terms"
import type { StoreRole } from "~/domain/people/roles"
import type { DeliveryTerms } from "~/domain/pricing/price-order"
import { findYard, type Yard } from "~/services/producers/find-yard.server"
import { findDeliverySchedule } from "./find-delivery-days.server"

/** The plain facts of a store, as its own people read them. */
export type StoreDetails = {
	name: string
	address: string
	receivingNote: string
	tierName: string
	rounds: Round[]
	delivery: DeliveryTerms
	terms: Terms
	resaleCertificateUntil: Day | null
	/** Who orders and who pays for the store, by name. */
	people: { name: string; email: string; roles: StoreRole[] }[]
	yard: Yard
}

/** Reads the facts of one store at one moment. Throws when there is no such store. */
export function findStoreDetails(query: {
	producerId: string
	storeId: string
	now: Date
	zone: string
}): Promise<StoreDetails> {
	const { producerId, storeId } = query
	return readProducer(producerId, async (tx) => {
		const [found] = await tx
			.select({ store: stores, tierName: priceTiers.name })
			.from(stores)
			.innerJoin(priceTiers, and(eq(priceTiers.producerId, stores.producerId), eq(priceTiers.id, stores.tierId)))
			.where(and(eq(stores.producerId, producerId), eq(stores.id, storeId)))
		if (!found) throw new Error("details are of a store that is there")
		const { store, tierName } = found
		const members = await tx
			.select({ name: users.name, email: users.email, role: memberships.role })
			.from(memberships)
			.innerJoin(users, eq(users.id, memberships.userId))
			.where(and(eq(memberships.producerId, producerId), eq(memberships.storeId, storeId), isNull(memberships.endedAt)))
			.orderBy(users.name, users.email)
		// The database lets a membership that names a store have no other role.
		const people = new Map<string, StoreDetails["people"][number]>()
		for (const { name, email, role } of members) {
			const person = people.get(email) ?? { name, email, roles: [] }
			people.set(email, { ...person, roles: [...person.roles, role as StoreRole] })
		}
		return {
			name: store.name,
			address: store.address,
			receivingNote: store.receivingNote,
			tierName,
			rounds: (await findDeliverySchedule(tx, query)).rounds,
			delivery: {
				minimumCents: store.minimumCents,
				deliveryChargeCents: store.deliveryChargeCents,
				freeAboveCents: store.freeAboveCents,
			},
			terms: {
				kind: store.termsKind,
				days: store.termsDays,
				discountBasisPoints: store.termsDiscountBasisPoints,
				discountDays: store.termsDiscountDays,
			},
			resaleCertificateUntil: store.resaleCertificateUntil,
			people: [...people.values()],
			yard: await findYard(tx, producerId),
		}
	})
}
