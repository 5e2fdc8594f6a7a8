/** What is known of a store's credit, in cents. `owedCents` is net of what is on its account; null is no limit. */
export type CreditFacts = { isStopped: boolean; creditLimitCents: number | null; owedCents: number }

/** Why the producer should look at an order before it is promised; nothing is refused for it. */
export type CreditWarning = { kind: "stopped" } | { kind: "over-limit"; owedCents: number; limitCents: number }

/**
 * Whether a store's order is to be looked at first: it is stopped, or what it owes with this order is above its limit.
 * Exactly at the limit is within it. Null when nothing speaks against it. The producer decides; this product's own rule.
 */
export function creditWarning(facts: CreditFacts, orderCents: number): CreditWarning | null {
	if (facts.isStopped) return { kind: "stopped" }
	const { creditLimitCents: limitCents, owedCents } = facts
	if (limitCents === null || owedCents + orderCents <= limitCents) return null
	return { kind: "over-limit", owedCents, limitCents }
}
