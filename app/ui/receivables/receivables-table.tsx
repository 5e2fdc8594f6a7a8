import { Link } from "react-router"
import { type Ageing, ageingBuckets } from "~/domain/invoicing/ageing"
import { formatMoney, plainMoney } from "~/domain/money"
import { AGEING_HEADS } from "~/domain/receivables/ageing-words"

type Owing = {
	slug: string
	name: string
	isStopped: boolean
	remindersHeld: boolean
	ageing: Ageing
	owedCents: number
	onAccountCents: number
	balanceCents: number
}
type Sums = Pick<Owing, "ageing" | "owedCents" | "onAccountCents" | "balanceCents"> & { stores: number }

const figure = (cents: number) => (cents === 0 ? "" : plainMoney(cents))

/** Who owes what, in columns by days late; the sums below are over all stores, not over this page alone. */
export function ReceivablesTable({
	stores,
	totals,
	storesHref,
}: {
	stores: readonly Owing[]
	totals: Sums
	storesHref: string
}) {
	return (
		<table className="sheet-table receivables-table">
			<caption className="sr-only">What each store owes, by days past the due date, in dollars</caption>
			<thead>
				<tr>
					<th scope="col">Store</th>
					{ageingBuckets.map((bucket) => (
						<th scope="col" className="num" key={bucket}>
							{AGEING_HEADS[bucket]}
						</th>
					))}
					<th scope="col" className="num">
						On account
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Owes in all
					</th>
				</tr>
			</thead>
			<tbody>
				{stores.map((store) => (
					<tr key={store.slug}>
						<th scope="row">
							<Link className="name inline-block py-1 text-body!" to={`${storesHref}/${store.slug}`}>
								{store.name}
							</Link>
							{(store.isStopped || store.remindersHeld) && <span className="note block">{standingWords(store)}</span>}
						</th>
						<Figures sums={store} />
					</tr>
				))}
			</tbody>
			<tfoot>
				<tr>
					<th scope="row">All {totals.stores === 1 ? "one store" : `${totals.stores} stores`}</th>
					<Figures sums={totals} />
				</tr>
			</tfoot>
		</table>
	)
}

function standingWords({ isStopped, remindersHeld }: Owing): string {
	const words = [isStopped && "orders stopped", remindersHeld && "reminders held"].filter(Boolean).join(", ")
	return words.charAt(0).toUpperCase() + words.slice(1)
}

function Figures({ sums }: { sums: Omit<Sums, "stores"> }) {
	return (
		<>
			{ageingBuckets.map((bucket) => (
				<td
					className={bucket === "current" ? "money" : "money late"}
					key={bucket}
					data-head={AGEING_HEADS[bucket]}
					data-empty={sums.ageing[bucket] === 0 || undefined}
				>
					{figure(sums.ageing[bucket])}
				</td>
			))}
			<td className="money" data-head="On account" data-empty={sums.onAccountCents === 0 || undefined}>
				{figure(-sums.onAccountCents)}
			</td>
			<td className="money in-all pr-4! desk:pr-8!" data-head="Owes in all">
				{formatMoney(sums.balanceCents)}
			</td>
		</>
	)
}
