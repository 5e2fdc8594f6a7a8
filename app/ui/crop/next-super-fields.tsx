import { SelectField, TextField } from "~/ui/forms/fields"

type SuperProduct = { id: string; name: string; detail: string }

/** What the next super is for, how much it holds, and the day it goes on. */
export function NextSuperFields({
	products,
	values,
	today,
	errorOf,
}: {
	products: readonly SuperProduct[]
	values: Record<string, string>
	today: string
	errorOf: (field: string) => string | undefined
}) {
	return (
		<>
			<SelectField
				name="productId"
				label="Its sections are for"
				options={products.map(({ id, name, detail }) => ({ value: id, label: detail ? `${name}, ${detail}` : name }))}
				defaultValue={values.productId}
				error={errorOf("productId")}
			/>
			<TextField
				name="capacityPieces"
				label="Pieces it holds"
				inputMode="numeric"
				defaultValue={values.capacityPieces ?? "40"}
				error={errorOf("capacityPieces")}
			/>
			<TextField
				name="setOn"
				label="Set on"
				type="date"
				max={today}
				defaultValue={values.setOn ?? today}
				error={errorOf("setOn")}
			/>
		</>
	)
}
