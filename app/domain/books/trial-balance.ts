import { accountsInOrder, type BookAccountKey } from "./accounts"
import { type BookEvent, type BookLine, entriesOf } from "./entries"

/** Debit and credit of an account, added up. */
type AccountTotal = { debitCents: number; creditCents: number }

/** The totals of the accounts that something was entered on. */
export type Totals = Partial<Record<BookAccountKey, AccountTotal>>

/**
 * The totals of all lines of these events. An event may stand for many of its kind with their amounts added up: the rules
 * only add and take off, so the totals are the same.
 */
export function totalsOf(events: readonly BookEvent[]): Totals {
	return addLines({}, events.flatMap(entriesOf))
}

function addLines(start: Totals, lines: readonly BookLine[]): Totals {
	const totals = { ...start }
	for (const { account, debitCents, creditCents } of lines) {
		const before = totals[account] ?? { debitCents: 0, creditCents: 0 }
		totals[account] = {
			debitCents: before.debitCents + debitCents,
			creditCents: before.creditCents + creditCents,
		}
	}
	return totals
}

/** Two totals together. */
export function addTotals(a: Totals, b: Totals): Totals {
	return addLines(
		a,
		Object.entries(b).map(([account, total]) => ({ account: account as BookAccountKey, ...total })),
	)
}

/** What is on an account: above zero a debit, below zero a credit. */
export function balanceOf(totals: Totals, account: BookAccountKey): number {
	const { debitCents = 0, creditCents = 0 } = totals[account] ?? {}
	return debitCents - creditCents
}

/** One account of a trial balance: what was on it before, what was entered, what is on it. Balances as `balanceOf`. */
type BalanceRow = { account: BookAccountKey; beforeCents: number; afterCents: number } & AccountTotal

export type TrialBalance = {
	rows: BalanceRow[]
	sum: AccountTotal
	/** Debits equal credits, and so do the balances before and after. */
	isBalanced: boolean
}

/** Sets out what was entered in a period on what stood before. Accounts on which nothing ever was are left out. */
export function trialBalance(before: Totals, entered: Totals): TrialBalance {
	const rows = accountsInOrder
		.filter((account) => before[account] || entered[account])
		.map((account) => {
			const { debitCents = 0, creditCents = 0 } = entered[account] ?? {}
			const beforeCents = balanceOf(before, account)
			return { account, beforeCents, debitCents, creditCents, afterCents: beforeCents + debitCents - creditCents }
		})
	const add = (key: "debitCents" | "creditCents" | "beforeCents" | "afterCents") =>
		rows.reduce((sum, row) => sum + row[key], 0)
	const sum = { debitCents: add("debitCents"), creditCents: add("creditCents") }
	return {
		rows,
		sum,
		isBalanced: sum.debitCents === sum.creditCents && add("beforeCents") === 0 && add("afterCents") === 0,
	}
}
