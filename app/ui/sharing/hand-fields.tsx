import { casesWords } from "~/domain/quantity"
import { TextField } from "~/ui/forms/fields"
import { QuantityField } from "~/ui/forms/quantity-field"
import type { ShareRow } from "./told-rules"

type HandFieldsProps = {
	rows: readonly ShareRow[]
	/** What the chosen rule gives each row. */
	ruled: readonly number[]
	supply: number
	/** Cases given in all as the fields stand, besides what is sure. */
	total: number
	values: Record<string, string>
	errors: Record<string, string>
	onType: (lineId: string, typed: string) => void
}

export const handName = (lineId: string) => `given-${lineId}`

/** A field for each store and a note. A field left empty gives what the rule gives. Opens without a script. */
export function HandFields({ rows, ruled, supply, total, values, errors, onType }: HandFieldsProps) {
	const isOpen = Object.keys(errors).length > 0 || rows.some(({ lineId }) => values[handName(lineId)])
	return (
		<details className="share-hand" open={isOpen}>
			<summary className="btn big">Change by hand</summary>
			<p className="note">
				An empty field gives what the rule gives. {total} of {casesWords(supply)} given as it stands
				{total > supply && <b className="short">, {total - supply} too many</b>}.
			</p>
			<ul>
				{rows.map(({ lineId, storeName, askedCases, leastCases }, index) => (
					<li key={lineId}>
						<span>
							{storeName}{" "}
							<span className="note">
								asked {askedCases}
								{leastCases > 0 && `, least ${leastCases}`}
							</span>
						</span>
						<QuantityField
							name={handName(lineId)}
							label={`Cases for ${storeName}`}
							defaultValue={values[handName(lineId)] ?? ""}
							placeholder={String(ruled[index] ?? 0)}
							error={errors[handName(lineId)]}
							onChange={(event) => onType(lineId, event.currentTarget.value)}
						/>
					</li>
				))}
			</ul>
			<TextField
				name="note"
				label="Why"
				hint="Stores whose figure you changed read this. It is needed to give less than a store’s least."
				maxLength={300}
				defaultValue={values.note ?? ""}
				error={errors.note}
			/>
		</details>
	)
}
