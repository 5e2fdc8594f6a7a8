/** The accounts of the books; the key of each in tables and code. */
export const bookAccountKeys = [
	"receivable",
	"sales",
	"delivery-income",
	"sales-tax",
	"finance-charges",
	"credits-given",
	"discount-given",
	"bad-debt",
	"cash",
	"bank",
	"on-its-way",
	"stripe",
	"card-fees",
	"disputes",
] as const
export type BookAccountKey = (typeof bookAccountKeys)[number]

/** How the bookkeeper names an account. */
export type AccountName = { number: string; name: string }

/** How each account is named, all of them. */
export type Chart = Readonly<Record<BookAccountKey, AccountName>>

/**
 * Number and name of each account as long as the bookkeeper has given no other. Numbers by class, 1 what is owned, 2 what
 * is owed, 4 income, 6 costs: common practice, no source.
 */
export const OWN_CHART: Chart = {
	cash: { number: "1000", name: "Cash" },
	bank: { number: "1010", name: "Bank" },
	stripe: { number: "1050", name: "Stripe, not paid out yet" },
	"on-its-way": { number: "1060", name: "Money on its way" },
	disputes: { number: "1070", name: "Disputed payments" },
	receivable: { number: "1200", name: "Owed by stores" },
	"sales-tax": { number: "2200", name: "Sales tax to hand on" },
	sales: { number: "4000", name: "Sales" },
	"delivery-income": { number: "4100", name: "Delivery charged" },
	"finance-charges": { number: "4200", name: "Finance charges" },
	"credits-given": { number: "4800", name: "Credits given" },
	"discount-given": { number: "4810", name: "Discounts for paying early" },
	"card-fees": { number: "6100", name: "Card and bank fees" },
	"bad-debt": { number: "6200", name: "Bad debt" },
}

/** What lies on an account: said below its name, as the bookkeeper's own names may differ. */
export const ACCOUNT_WORDS: Readonly<Record<BookAccountKey, string>> = {
	cash: "coins and bills, from stores and from the stall",
	bank: "checks, transfers and what Stripe paid out",
	stripe: "cards and bank debits until they are paid out",
	"on-its-way": "used by no entry: a debit on its way is entered when it clears",
	disputes: "taken by a bank while a dispute is open",
	receivable: "invoices less all that settles them; what is on account counts against it",
	"sales-tax": "charged to stores and contained in stall prices",
	sales: "goods to stores and at the stall, without tax",
	"delivery-income": "delivery on invoices",
	"finance-charges": "charged for paying late",
	"credits-given": "for broken comb, prices, quantities",
	"discount-given": "taken by stores that paid in time",
	"card-fees": "kept by Stripe, entered with its payout",
	"bad-debt": "invoices given up as lost",
}

/** The accounts by their own class and number, as a trial balance lists them. */
export const accountsInOrder: readonly BookAccountKey[] = bookAccountKeys.toSorted((a, b) =>
	OWN_CHART[a].number.localeCompare(OWN_CHART[b].number),
)

/** All accounts by name: the bookkeeper's where there is one. */
export function chartOf(own: readonly (AccountName & { account: BookAccountKey })[]): Chart {
	const chart: Record<BookAccountKey, AccountName> = { ...OWN_CHART }
	for (const { account, number, name } of own) chart[account] = { number, name }
	return chart
}
