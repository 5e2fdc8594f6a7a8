import { ACCOUNT_WORDS, type BookAccountKey, type Chart } from "~/domain/books/accounts"
import type { TrialBalance } from "~/domain/books/trial-balance"
import { formatMoney, plainMoney } from "~/domain/money"

/** "1,118.00 debit"; the side in words, since a sign says nothing of it. Nothing for nothing. */
function balanceWords(cents: number): string {
	if (cents === 0) return "0.00"
	return `${plainMoney(Math.abs(cents))} ${cents > 0 ? "debit" : "credit"}`
}

/** The trial balance of a period: what stood on each account, what was entered, what stands there now. */
export function BalanceTable({ balance, chart }: { balance: TrialBalance; chart: Chart }) {
	const { rows, sum, isBalanced } = balance
	return (
		<table className="sheet-table books-balance">
			<caption className="sr-only">Trial balance</caption>
			<thead>
				<tr>
					<th scope="col">Account</th>
					<th scope="col" className="num before">
						Before
					</th>
					<th scope="col" className="num">
						Debit
					</th>
					<th scope="col" className="num">
						Credit
					</th>
					<th scope="col" className="num">
						After
					</th>
				</tr>
			</thead>
			<tbody>
				{rows.map(({ account, beforeCents, debitCents, creditCents, afterCents }) => (
					<tr key={account}>
						<th scope="row">
							<AccountName account={account} chart={chart} />
						</th>
						<td className="num money before">{balanceWords(beforeCents)}</td>
						<td className="num money">{debitCents === 0 ? "" : plainMoney(debitCents)}</td>
						<td className="num money">{creditCents === 0 ? "" : plainMoney(creditCents)}</td>
						<td className="num money">{balanceWords(afterCents)}</td>
					</tr>
				))}
			</tbody>
			<tfoot>
				<tr>
					<th scope="row">{isBalanced ? "All accounts" : <span className="short">Does not balance</span>}</th>
					<td className="before" />
					<td className="num money">{plainMoney(sum.debitCents)}</td>
					<td className="num money">{plainMoney(sum.creditCents)}</td>
					<td className="num">
						{isBalanced ? (
							"balances"
						) : (
							<span className="short">differs by {formatMoney(Math.abs(sum.debitCents - sum.creditCents))}</span>
						)}
					</td>
				</tr>
			</tfoot>
		</table>
	)
}

function AccountName({ account, chart }: { account: BookAccountKey; chart: Chart }) {
	const { number, name } = chart[account]
	return (
		<>
			<span className="name">
				<span className="fig text-ink-faint">{number}</span> {name}
			</span>
			<span className="note account-words">{ACCOUNT_WORDS[account]}</span>
		</>
	)
}
