import type { ReactNode } from "react"

/** A fact with its name. */
export type Fact = { name: string; fact: ReactNode }

/** What is known of a lot, as pairs of a name and a fact; those without a fact are left out. */
export function FactList({ facts }: { facts: readonly Fact[] }) {
	return (
		<dl className="lot-facts">
			{facts
				.filter(({ fact }) => fact !== null && fact !== "")
				.map(({ name, fact }) => (
					<div key={name}>
						<dt>{name}</dt>
						<dd>{fact}</dd>
					</div>
				))}
		</dl>
	)
}
