import { type SQL, sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { type Ageing, ageingOf } from "~/domain/invoicing/ageing"
import { agedSums, onAccountByStore } from "./aged-sums.server"

/** What one store owes, in cents; `balanceCents` is what is owed less what is on its account. */
export type StoreOwing = {
	slug: string
	name: string
	isStopped: boolean
	remindersHeld: boolean
	ageing: Ageing
	owedCents: number
	onAccountCents: number
	balanceCents: number
	oldestDueOn: Day | null
}

export type ReceivablesOrder = "owed" | "name"

/** Who owes what: one page, and the sums over all stores. */
export type Receivables = {
	stores: StoreOwing[]
	next: string | null
	totals: { stores: number; ageing: Ageing; owedCents: number; onAccountCents: number; balanceCents: number }
}

type Row = Omit<StoreOwing, "ageing" | "balanceCents"> & { aged: (number | null)[] | null }
type TotalsRow = { stores: number; aged: (number | null)[]; owedCents: number; onAccountCents: number }

const PAGE = 25

/**
 * Every store that owes something or has money on its account, the most owing first or by name, 25 at a time; with
 * `isWhole` all of them. `after` is the `next` of an earlier page; one that is malformed gives the first page. Days are
 * counted past the due date on `today`.
 */
export function listReceivables(query: {
	producerId: string
	today: Day
	by: ReceivablesOrder
	after: string | null
	isWhole?: boolean
}): Promise<Receivables> {
	const { producerId, today, by, isWhole = false } = query
	const order = by === "owed" ? sql`"owedCents" desc, slug` : sql`name, slug`
	const limit = isWhole ? sql`` : sql`limit ${PAGE + 1}`
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ totals: TotalsRow; page: Row[] }>(sql`
			with owed as (
				select i.store_id, ${agedSums(sql`i.due_on`, sql`i.open_cents`, today)} as aged,
					sum(i.open_cents)::float8 as cents, min(i.due_on)::text as oldest
				from invoices i where i.producer_id = ${producerId} and i.open_cents > 0
				group by i.store_id
			), account as (${onAccountByStore(producerId)}), standing as materialized (
				select s.slug, s.name, s.is_stopped as "isStopped", s.reminders_held as "remindersHeld", o.aged,
					coalesce(o.cents, 0) as "owedCents", coalesce(a.cents, 0) as "onAccountCents", o.oldest as "oldestDueOn"
				from owed o full join account a on a.store_id = o.store_id
				join stores s on s.producer_id = ${producerId} and s.id = coalesce(o.store_id, a.store_id)
			)
			select (
					select json_build_object('stores', count(*), 'owedCents', coalesce(sum("owedCents"), 0),
						'onAccountCents', coalesce(sum("onAccountCents"), 0),
						'aged', array[${sql.join(
							[1, 2, 3, 4, 5].map((place) => sql`sum(aged[${sql.raw(String(place))}])`),
							sql`, `,
						)}])
					from standing
				) as totals,
				coalesce((select json_agg(row_to_json(page)) from (
					select * from standing where ${beyond(query)} order by ${order} ${limit}
				) as page), '[]'::json) as page`)
		const { totals, page } = rows[0] as { totals: TotalsRow; page: Row[] }
		const shown = isWhole ? page : page.slice(0, PAGE)
		const last = shown.at(-1)
		return {
			stores: shown.map(({ aged, ...store }) => ({
				...store,
				ageing: ageingOf(aged ?? []),
				balanceCents: store.owedCents - store.onAccountCents,
			})),
			next: page.length > shown.length && last ? (by === "owed" ? `${last.owedCents}_${last.slug}` : last.slug) : null,
			totals: {
				stores: totals.stores,
				ageing: ageingOf(totals.aged),
				owedCents: totals.owedCents,
				onAccountCents: totals.onAccountCents,
				balanceCents: totals.owedCents - totals.onAccountCents,
			},
		}
	})
}

function beyond({ producerId, by, after }: Parameters<typeof listReceivables>[0]): SQL {
	if (by === "owed") {
		const [, cents, slug] = /^(\d{1,15})_([a-z0-9-]{1,200})$/.exec(after ?? "") ?? []
		if (cents === undefined || slug === undefined) return sql`true`
		return sql`("owedCents" < ${cents}::float8 or ("owedCents" = ${cents}::float8 and slug > ${slug}))`
	}
	if (!/^[a-z0-9-]{1,200}$/.test(after ?? "")) return sql`true`
	return sql`(name, slug) > (select f.name, f.slug from stores f where f.producer_id = ${producerId} and f.slug = ${after})`
}
