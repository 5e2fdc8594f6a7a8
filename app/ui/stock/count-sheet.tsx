import { Form } from "react-router"
import { Button } from "~/ui/forms/button"
import { FieldError, fieldId } from "~/ui/forms/field-error"
import { TextField } from "~/ui/forms/fields"
import { QuantityField } from "~/ui/forms/quantity-field"

type SheetLot = { lotId: string; code: string; productName: string; detail: string; bestBefore: string }

type CountSheetProps = {
	lots: readonly SheetLot[]
	/** How many lots can be named that the ledger has elsewhere. */
	otherRows: number
	values: Record<string, string>
	errors: Record<string, string>
}

/**
 * The sheet of a count: a field for each lot, blank where it was not counted, and rows for lots that are there
 * unexpectedly. It does not say what the ledger has, so that the count is not led by it. Prints with empty boxes.
 */
export function CountSheet({ lots, otherRows, values, errors }: CountSheetProps) {
	return (
		<Form method="post" noValidate className="count-sheet">
			<table className="sheet-table">
				<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">Pieces of each lot</caption>
				<thead>
					<tr>
						<th scope="col">Lot</th>
						<th scope="col">Product</th>
						<th scope="col" className="max-desk:hidden">
							Best before
						</th>
						<th scope="col" className="num pr-4! desk:pr-8!">
							Counted
						</th>
					</tr>
				</thead>
				<tbody>
					{lots.map((lot) => (
						<tr key={lot.lotId}>
							<td className="fig whitespace-nowrap">{lot.code}</td>
							<td>
								{lot.productName}
								<span className="note block">{lot.detail}</span>
								{errors[`count-${lot.lotId}`] && (
									<FieldError id={`${fieldId(`count-${lot.lotId}`)}-error`}>{errors[`count-${lot.lotId}`]}</FieldError>
								)}
							</td>
							<td className="max-desk:hidden">{lot.bestBefore}</td>
							<td className="num pr-4! desk:pr-8!">
								<QuantityField
									name={`count-${lot.lotId}`}
									label={`Pieces of lot ${lot.code} counted`}
									defaultValue={values[`count-${lot.lotId}`]}
									error={errors[`count-${lot.lotId}`]}
									errorId={`${fieldId(`count-${lot.lotId}`)}-error`}
								/>
							</td>
						</tr>
					))}
				</tbody>
			</table>
			<fieldset className="count-others">
				<legend className="head-italic">Lots that are there and not on this list</legend>
				{Array.from({ length: otherRows }, (_, row) => (
					<OtherLot
						// biome-ignore lint/suspicious/noArrayIndexKey: the rows are alike and stay in their places
						key={row}
						row={row}
						values={values}
						errors={errors}
					/>
				))}
			</fieldset>
			<div className="px-4 py-4 desk:px-8">
				<Button variant="primary" size="big" name="intent" value="compare">
					Compare with the ledger
				</Button>
			</div>
		</Form>
	)
}

function OtherLot({ row, values, errors }: { row: number } & Pick<CountSheetProps, "values" | "errors">) {
	const code = `other-code-${row}`
	const count = `other-count-${row}`
	return (
		<div className="count-other">
			<TextField
				name={code}
				label={`Lot code, row ${row + 1}`}
				autoComplete="off"
				spellCheck={false}
				defaultValue={values[code]}
				error={errors[code]}
			/>
			<TextField
				name={count}
				label="Pieces"
				inputMode="numeric"
				autoComplete="off"
				defaultValue={values[count]}
				error={errors[count]}
			/>
		</div>
	)
}
