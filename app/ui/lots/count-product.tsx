import { type FormEvent, useState } from "react"
import { TextField } from "~/ui/forms/fields"

type CountedProduct = {
	productId: string
	name: string
	detail: string
	grades: readonly string[]
	flora: string
	bestBeforeOn: string
	expectedReleaseOn: string
	supers: readonly { id: string; label: string; capacityPieces: number }[]
}

type Typed = Readonly<Record<string, string>>

/** The id of a cell of the count: by super, or of the row for all supers of a product. */
export const cellId = (row: string, index: number) => `${row}-${index}`

/** The name of that cell in the form. */
export const cellName = (row: string, grade: string) => `${row} ${grade}`

const sumOf = (values: readonly string[]) =>
	values.reduce((sum, value) => sum + (/^\s*\d{1,3}\s*$/.test(value) ? Number(value) : 0), 0)

/** What came off for one product: pieces by grade, by super or in one row for all, and what holds for all its lots. */
export function CountProduct({
	product,
	typed,
	errorOf,
}: {
	product: CountedProduct
	typed: Typed
	errorOf: (id: string) => string | undefined
}) {
	const { productId, supers, grades } = product
	const rows = [
		...supers.map(({ id, label, capacityPieces }) => ({ row: `n-${id}`, label, capacity: capacityPieces })),
		{ row: `t-${productId}`, label: "Or all of them together", capacity: null },
	]
	const names = rows.flatMap(({ row }) => grades.map((grade) => cellName(row, grade)))
	const [sum, setSum] = useState(sumOf(names.map((name) => typed[name] ?? "")))
	const capacity = supers.reduce((all, { capacityPieces }) => all + capacityPieces, 0)
	const add = ({ currentTarget }: FormEvent<HTMLTableElement>) =>
		setSum(sumOf([...currentTarget.querySelectorAll("input")].map(({ value }) => value)))
	return (
		<section aria-labelledby={`head-${productId}`}>
			<h2 className="name px-4 pt-6 pb-2 desk:px-8" id={`head-${productId}`}>
				{product.name} <span className="note">{product.detail}</span>
			</h2>
			<table className="sheet-table count-table" onInput={add}>
				<thead>
					<tr>
						<th scope="col">Pieces off</th>
						{grades.map((grade) => (
							<th scope="col" className="num" key={grade}>
								{grade}
							</th>
						))}
					</tr>
				</thead>
				<tbody>
					{rows.map(({ row, label, capacity: holds }) => (
						<tr key={row}>
							<th scope="row">
								{label}
								{holds !== null && <span className="note block">holds {holds}</span>}
								{grades.map((_, index) => {
									const error = errorOf(cellId(row, index))
									return error ? (
										<span className="field-error" id={`${cellId(row, index)}-error`} key={cellId(row, index)}>
											{error}
										</span>
									) : null
								})}
							</th>
							{grades.map((grade, index) => {
								const id = cellId(row, index)
								const isWrong = errorOf(id) !== undefined
								return (
									<td className="num" key={grade}>
										<label className="note desk:sr-only" htmlFor={id}>
											{grade}
											<span className="sr-only">, {label}</span>
										</label>
										<input
											className="qty"
											id={id}
											name={cellName(row, grade)}
											inputMode="numeric"
											autoComplete="off"
											maxLength={5}
											defaultValue={typed[cellName(row, grade)]}
											aria-invalid={isWrong || undefined}
											aria-describedby={isWrong ? `${id}-error` : undefined}
										/>
									</td>
								)
							})}
						</tr>
					))}
				</tbody>
				<tfoot>
					<tr>
						<td colSpan={grades.length + 1}>
							<b className={sum > capacity ? "fig short" : "fig"}>{sum}</b> pieces written, of {capacity} that{" "}
							{supers.length === 1 ? "this super holds" : "these supers hold"}. An empty field is none.
						</td>
					</tr>
				</tfoot>
			</table>
			<div className="lot-fields">
				<TextField
					name={`moisture-${productId}`}
					id={`moisture-${productId}`}
					label="Water, %"
					hint="By refractometer, as 17.6. Empty when not measured."
					inputMode="decimal"
					defaultValue={typed[`moisture-${productId}`]}
					error={errorOf(`moisture-${productId}`)}
				/>
				<TextField
					name={`pfund-${productId}`}
					id={`pfund-${productId}`}
					label="Pfund, mm"
					hint="Gives the colour its name."
					inputMode="decimal"
					defaultValue={typed[`pfund-${productId}`]}
					error={errorOf(`pfund-${productId}`)}
				/>
				<TextField
					name={`flora-${productId}`}
					id={`flora-${productId}`}
					label="Flora"
					hint="Name a plant only where it is the chief source."
					maxLength={80}
					defaultValue={typed[`flora-${productId}`] ?? product.flora}
				/>
				<TextField
					name={`release-${productId}`}
					id={`release-${productId}`}
					label="Released likely on"
					hint="Once frozen and weighed; stores see it from then."
					type="date"
					defaultValue={typed[`release-${productId}`] ?? product.expectedReleaseOn}
					error={errorOf(`release-${productId}`)}
				/>
				<TextField
					name={`best-${productId}`}
					id={`best-${productId}`}
					label="Best before"
					type="date"
					defaultValue={typed[`best-${productId}`] ?? product.bestBeforeOn}
					error={errorOf(`best-${productId}`)}
				/>
			</div>
		</section>
	)
}
