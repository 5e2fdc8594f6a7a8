import type { deliveryRounds, invitations, memberships, shutDays, storeRounds, stores } from "~/db/schema"
import { addDays } from "~/domain/calendar"
import type { Catalogue } from "./plan-catalogue"
import type { DemoStore } from "./scenario"
import { minutesAfter, named, type Season } from "./season"

/** A store with its id and whoever orders for it. */
export type StoreOfSeason = DemoStore & { id: string; buyerId: string | null; buyerEmail: string | null }

export type Stores = {
	stores: ReadonlyMap<string, StoreOfSeason>
	rows: {
		rounds: (typeof deliveryRounds.$inferInsert)[]
		shutDays: (typeof shutDays.$inferInsert)[]
		stores: (typeof stores.$inferInsert)[]
		storeRounds: (typeof storeRounds.$inferInsert)[]
		memberships: (typeof memberships.$inferInsert)[]
		invitations: (typeof invitations.$inferInsert)[]
	}
}

/** The stores with their rounds, and who may do what at the producer and at each store. */
export function planStores(season: Season, catalogue: Catalogue): Stores {
	const { scenario, producerId, today, now, chance, userId } = season
	const rounds = scenario.rounds.map((round) => ({ ...round, id: chance.id() }))
	const stores = new Map(
		scenario.stores.map((store) => {
			const buyer = scenario.members.find((member) => "store" in member && member.store === store.slug)
			return [
				store.slug,
				{
					...store,
					id: chance.id(),
					buyerId: buyer ? userId(buyer.email) : null,
					buyerEmail: buyer?.email ?? null,
				},
			]
		}),
	)
	const storeId = (member: object) =>
		"store" in member && typeof member.store === "string" ? named(stores, member.store).id : null
	return {
		stores,
		rows: {
			rounds: rounds.map((round) => ({ producerId, ...round })),
			shutDays: season.days.shut.map(({ on, reason }) => ({ producerId, shutOn: on, reason })),
			stores: [...stores.values()].map((store, index) => ({
				producerId,
				id: store.id,
				slug: store.slug,
				name: store.name,
				tierId: named(catalogue.tierIds, store.tier),
				address: store.address,
				phone: `555-01${String(index + 10)}`,
				email: `receiving@${mailDomain(store)}`,
				receivingNote: store.receivingNote,
				minimumCents: store.minimumCents,
				deliveryChargeCents: store.deliveryChargeCents,
				freeAboveCents: store.freeAboveCents,
				termsKind: store.termsKind,
				termsDays: store.termsDays,
				termsDiscountBasisPoints: store.discount?.basisPoints ?? 0,
				termsDiscountDays: store.discount?.days ?? 0,
				resaleCertificateUntil: store.hasCertificate ? addDays(today, 400) : null,
			})),
			storeRounds: [...stores.values()].flatMap((store) =>
				rounds
					.filter((round) => store.rounds.includes(round.weekday))
					.map((round) => ({ producerId, storeId: store.id, roundId: round.id })),
			),
			memberships: scenario.members.map((member) => ({
				producerId,
				id: chance.id(),
				userId: userId(member.email),
				role: member.role,
				storeId: storeId(member),
			})),
			invitations: scenario.invitations.map((invitation) => {
				const createdAt = minutesAfter(now, invitation.wasAccepted ? -90 * 1440 : -1440)
				return {
					producerId,
					id: chance.id(),
					email: invitation.email,
					name: invitation.name,
					role: invitation.role,
					storeId: storeId(invitation),
					// The hash of no token anyone has: the demo's invitations are there to be seen, not to be followed.
					tokenHash: chance.hash(),
					invitedBy: userId(scenario.ownerEmail),
					createdAt,
					expiresAt: minutesAfter(createdAt, 14 * 1440),
					acceptedAt: invitation.wasAccepted ? minutesAfter(createdAt, 200) : null,
				}
			}),
		},
	}
}

/** Where the store's buyer has a mail address, or one made from the store's own name. */
function mailDomain(store: StoreOfSeason): string {
	return store.buyerEmail?.split("@")[1] ?? `${store.slug.replaceAll("-", "")}.example.test`
}
