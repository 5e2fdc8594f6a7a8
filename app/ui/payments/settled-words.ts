import { formatMoney } from "~/domain/money"

type Noted = {
	settledInvoices: readonly { number: string; cents: number; discountCents: number }[]
	onAccountCents: number
}

/** "It settles $929.90 of invoice 2026-0012, with $18.98 off for paying early; $20.00 stays on the store’s account." */
export function settledWords({ settledInvoices, onAccountCents }: Noted): string {
	const parts = settledInvoices.map(
		({ number, cents, discountCents }) =>
			`${formatMoney(cents)} of invoice ${number}${discountCents > 0 ? `, with ${formatMoney(discountCents)} off for paying early` : ""}`,
	)
	const settles = parts.length > 0 ? [`It settles ${parts.join(", ")}`] : []
	const over = onAccountCents > 0 ? [`${formatMoney(onAccountCents)} stays on the store’s account`] : []
	return `${[...settles, ...over].join("; ")}.`
}
