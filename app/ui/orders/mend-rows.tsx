import type { UnmatchedRow } from "~/domain/orders/read-columns"
import { Button } from "~/ui/forms/button"
import type { SheetProduct } from "./price-sheet"

/** The rows of a list that name no product of the sheet, each to be given one or to be left out. */
export function MendRows({ rows, products }: { rows: readonly UnmatchedRow[]; products: readonly SheetProduct[] }) {
	if (rows.length === 0) return null
	return (
		<section className="mend-rows" aria-labelledby="mend-rows">
			<h2 className="head-italic" id="mend-rows">
				{rows.length === 1
					? "One row of the list names no product here"
					: `${rows.length} rows of the list name no product here`}
			</h2>
			<table className="sheet-table">
				<thead>
					<tr>
						<th scope="col" className="num">
							Row
						</th>
						<th scope="col">Code in the list</th>
						<th scope="col" className="num">
							Cases
						</th>
						<th scope="col">Is meant as</th>
					</tr>
				</thead>
				<tbody>
					{rows.map((row, index) => (
						<tr key={`${row.row} ${row.code}`}>
							<td className="num fig">{row.row}</td>
							<td className="break-words">{row.code || <span className="note">none</span>}</td>
							<td className="num fig">{row.cases}</td>
							<td>
								<input type="hidden" name={`mend-row-${index}`} value={row.row} />
								<input type="hidden" name={`mend-code-${index}`} value={row.code} />
								<input type="hidden" name={`mend-cases-${index}`} value={row.cases} />
								<select className="input" name={`mend-${index}`} aria-label={`Product for row ${row.row}, ${row.code}`}>
									<option value="">Choose a product</option>
									{products.map(({ productId, code, name, detail }) => (
										<option key={productId} value={productId}>
											{code} {name}, {detail}
										</option>
									))}
									<option value="drop">Leave this row out</option>
								</select>
							</td>
						</tr>
					))}
				</tbody>
			</table>
			<Button name="intent" value="mend" className="mt-2">
				Put these rows in
			</Button>
		</section>
	)
}
