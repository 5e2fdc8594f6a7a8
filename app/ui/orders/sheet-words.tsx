import { TextField } from "~/ui/forms/fields"

type SheetWordsProps = { values: Readonly<Record<string, string>>; errors: Readonly<Record<string, string>> }

/** The store's own number for the order, and a note with it: folded away until wanted. */
export function SheetWords({ values, errors }: SheetWordsProps) {
	return (
		<details className="mt-3" open={Boolean(errors.poNumber || errors.note || values.poNumber || values.note)}>
			<summary className="py-1 font-semibold text-clover">Add your order number or a note</summary>
			<div className="mt-2 grid gap-3">
				<TextField
					name="poNumber"
					label="Your order number"
					defaultValue={values.poNumber}
					error={errors.poNumber}
					autoComplete="off"
				/>
				<TextField
					name="note"
					label="A note with the order"
					defaultValue={values.note}
					error={errors.note}
					autoComplete="off"
				/>
			</div>
		</details>
	)
}

/** A list made elsewhere, put into the sheet: a file, or what a spreadsheet has copied. */
export function SheetList({ error }: { error: string | undefined }) {
	return (
		<details className="mt-2" open={Boolean(error)}>
			<summary className="py-1 font-semibold text-clover">Fill it in from a list</summary>
			<div className="mt-2 grid gap-2">
				<TextField
					name="list"
					type="file"
					accept=".csv,.txt,text/csv,text/plain"
					label="A CSV file of product codes and cases"
					hint="Two columns copied in a spreadsheet can be pasted anywhere on the sheet, too."
					error={error}
				/>
				<button
					type="submit"
					className="btn justify-self-start"
					name="intent"
					value="list"
					formEncType="multipart/form-data"
				>
					Put the list in
				</button>
			</div>
		</details>
	)
}
