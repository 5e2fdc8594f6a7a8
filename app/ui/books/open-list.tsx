import { type Day, dayWords } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"

const HEADS = {
	"sent-not-invoiced": ["order sent and not invoiced", "orders sent and not invoiced"],
	"on-its-way": ["payment on its way", "payments on their way"],
	"refund-asked": ["refund or dispute not decided", "refunds or disputes not decided"],
	"stripe-differs": ["difference with Stripe not settled", "differences with Stripe not settled"],
	"market-open": ["market day not closed", "market days not closed"],
} as const

type StillOpen = {
	of: keyof typeof HEADS
	count: number
	examples: readonly { words: string; on: Day; cents: number | null }[]
}

/** What is still open in a period that is about to be closed: counted, and the earliest of each by name. */
export function OpenList({ stillOpen }: { stillOpen: readonly StillOpen[] }) {
	return (
		<ul className="open-list">
			{stillOpen.map(({ of, count, examples }) => (
				<li key={of}>
					<b className="short">
						{count} {HEADS[of][count === 1 ? 0 : 1]}
					</b>
					<ul>
						{examples.map(({ words, on, cents }) => (
							<li key={`${words} ${on} ${cents}`}>
								{words}, {dayWords(on)}
								{cents === null ? "" : `, ${formatMoney(cents)}`}
							</li>
						))}
						{count > examples.length && <li>and {count - examples.length} more</li>}
					</ul>
				</li>
			))}
		</ul>
	)
}
