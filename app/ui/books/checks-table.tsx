import { formatMoney, plainMoney } from "~/domain/money"
import { CHECKS } from "./check-words"

type Check = { of: keyof typeof CHECKS; papersCents: number; booksCents: number }

/** What must agree when the books are right, a row each, with the word whether it does. */
export function ChecksTable({ checks }: { checks: readonly Check[] }) {
	return (
		<table className="sheet-table books-checks">
			<caption className="sr-only">What must agree</caption>
			<thead>
				<tr>
					<th scope="col">These two must agree</th>
					<th scope="col" className="num">
						The first
					</th>
					<th scope="col" className="num">
						The second
					</th>
					<th scope="col">Do they?</th>
				</tr>
			</thead>
			<tbody>
				{checks.map(({ of, papersCents, booksCents }) => (
					<tr key={of}>
						<th scope="row">{CHECKS[of].what}</th>
						<td className="num money">{plainMoney(papersCents)}</td>
						<td className="num money">{plainMoney(booksCents)}</td>
						<td className="verdict">
							{papersCents === booksCents ? (
								"agree"
							) : (
								<>
									<span className="short">differ by {formatMoney(Math.abs(papersCents - booksCents))}</span>{" "}
									<span className="note">{CHECKS[of].why}</span>
								</>
							)}
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}
