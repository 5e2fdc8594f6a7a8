import { Link } from "react-router"
import { type Ageing, ageingBuckets } from "~/domain/invoicing/ageing"
import { formatMoney } from "~/domain/money"
import { AGEING_FILLS, AGEING_HEADS } from "~/domain/receivables/ageing-words"

type Bar = { slug: string; name: string; ageing: Ageing; owedCents: number }

/**
 * What each store owes as one bar, its parts by days late told apart by their hatching; the longest bar is the store that
 * owes most of those shown. The table below has the same figures.
 */
export function AgeingPicture({ stores, storesHref }: { stores: readonly Bar[]; storesHref: string }) {
	const owing = stores.filter(({ owedCents }) => owedCents > 0)
	const most = Math.max(1, ...owing.map(({ owedCents }) => owedCents))
	if (owing.length === 0) return null
	return (
		<section className="ageing-picture" aria-label="What is owed, drawn">
			<AgeingPatterns />
			<AgeingKey />
			<ul>
				{owing.map((store) => (
					<li key={store.slug}>
						<Link className="ageing-name" to={`${storesHref}/${store.slug}`}>
							{store.name}
						</Link>
						<AgeingBar ageing={store.ageing} mostCents={most} label={barWords(store)} />
						<span className="money">{formatMoney(store.owedCents)}</span>
					</li>
				))}
			</ul>
		</section>
	)
}

/** "Pantry & Plume owes $929.90: $684.00 not due yet, $245.90 1–30 days late". */
function barWords({ name, owedCents, ageing }: Bar): string {
	const parts = ageingBuckets
		.filter((bucket) => ageing[bucket] > 0)
		.map((bucket) => `${formatMoney(ageing[bucket])} ${AGEING_HEADS[bucket].toLowerCase()}`)
	return `${name} owes ${formatMoney(owedCents)}: ${parts.join(", ")}`
}

/** One bar. Its whole width is `mostCents`; a part that is there is at least a hair wide. */
export function AgeingBar({ ageing, mostCents, label }: { ageing: Ageing; mostCents: number; label: string }) {
	const share = (cents: number) => `${Math.round((cents / mostCents) * 10_000) / 100}%`
	let before = 0
	return (
		<svg className="ageing-bar" width="100%" height="18" role="img" aria-label={label}>
			{ageingBuckets.map((bucket) => {
				const from = before
				before += ageing[bucket]
				if (ageing[bucket] === 0) return null
				return (
					<rect
						key={bucket}
						className={AGEING_FILLS[bucket]}
						x={share(from)}
						y="1"
						width={share(ageing[bucket])}
						height="16"
					/>
				)
			})}
		</svg>
	)
}

function AgeingKey() {
	return (
		<p className="ageing-key">
			{ageingBuckets.map((bucket) => (
				<span key={bucket}>
					<svg width="26" height="18" aria-hidden="true">
						<rect className={AGEING_FILLS[bucket]} x="1" y="1" width="24" height="16" />
					</svg>
					{AGEING_HEADS[bucket]}
				</span>
			))}
		</p>
	)
}

/** The hatchings, by the names that the style sheet fills with: once on a page that draws bars. */
export function AgeingPatterns() {
	return (
		<svg className="ageing-patterns" width="0" height="0" aria-hidden="true">
			<defs>
				<pattern id="age-dots" width="6" height="6" patternUnits="userSpaceOnUse">
					<circle className="age-ink" cx="3" cy="3" r="1.1" />
				</pattern>
				<pattern id="age-lines" width="6" height="6" patternUnits="userSpaceOnUse">
					<path className="age-stroke" d="M-1 7L7 -1" />
				</pattern>
				<pattern id="age-cross" width="6" height="6" patternUnits="userSpaceOnUse">
					<path className="age-stroke" d="M-1 7L7 -1M-1 -1L7 7" />
				</pattern>
			</defs>
		</svg>
	)
}
