import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Terms } from "~/domain/invoicing/terms"

/** A store as the desk lists it. */
export type ListedStore = {
	slug: string
	name: string
	address: string
	tierName: string
	minimumCents: number
	deliveryChargeCents: number
	freeAboveCents: number | null
	terms: Terms
	/** ISO weekdays of the rounds that stop there. */
	weekdays: number[]
	/** Who orders or pays for it, by name. */
	people: { name: string; pays: boolean }[]
	openCents: number
	isActive: boolean
}

type Row = Omit<ListedStore, "terms"> & {
	termsKind: Terms["kind"]
	termsDays: number
	discountBasisPoints: number
	discountDays: number
}

/** All stores of a producer by name. One statement. */
export function listStores(query: { producerId: string }): Promise<ListedStore[]> {
	const { producerId } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Row>(sql`
			select s.slug, s.name, s.address, t.name as "tierName", s.minimum_cents as "minimumCents", s.is_active as "isActive",
				s.delivery_charge_cents as "deliveryChargeCents", s.free_above_cents as "freeAboveCents",
				s.terms_kind as "termsKind", s.terms_days as "termsDays",
				s.terms_discount_basis_points as "discountBasisPoints", s.terms_discount_days as "discountDays",
				array(
					select r.weekday::int from store_rounds sr
					join delivery_rounds r on r.producer_id = sr.producer_id and r.id = sr.round_id
					where sr.producer_id = s.producer_id and sr.store_id = s.id order by r.weekday
				) as weekdays,
				coalesce((
					select json_agg(json_build_object('name', who.name, 'pays', who.pays) order by who.name) from (
						select u.name, bool_or(m.role = 'payer') as pays from memberships m join users u on u.id = m.user_id
						where m.producer_id = s.producer_id and m.store_id = s.id and m.ended_at is null group by u.id, u.name
					) as who
				), '[]'::json) as people,
				coalesce((
					select sum(i.open_cents) from invoices i
					where i.producer_id = s.producer_id and i.store_id = s.id and i.open_cents > 0
				), 0)::int as "openCents"
			from stores s
			join price_tiers t on t.producer_id = s.producer_id and t.id = s.tier_id
			where s.producer_id = ${producerId}
			order by s.is_active desc, s.name, s.id`)
		return rows.map(({ termsKind, termsDays, discountBasisPoints, discountDays, ...store }) => ({
			...store,
			terms: { kind: termsKind, days: termsDays, discountBasisPoints, discountDays },
		}))
	})
}
