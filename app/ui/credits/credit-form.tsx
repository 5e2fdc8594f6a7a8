import { Form } from "react-router"
import { formatMoney, plainMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { Button } from "~/ui/forms/button"
import { SelectField, TextField } from "~/ui/forms/fields"
import { QuantityField } from "~/ui/forms/quantity-field"

type Line = { id: string; code: string; name: string; detail: string; pieces: number; lineCents: number }

type CreditFormProps = {
	storeName: string
	lines: readonly Line[]
	leftCents: number
	creditId: string
	typed: Record<string, string> | null
	errors: readonly { field?: string; message: string }[]
	isBusy: boolean
}

/** A credit by hand: what it is for and why, and of each line pieces at their price or an amount. */
export function CreditForm({ storeName, lines, leftCents, creditId, typed, errors, isBusy }: CreditFormProps) {
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	return (
		<Form method="post" noValidate aria-label="Credit">
			<input type="hidden" name="creditId" value={typed?.creditId ?? creditId} />
			<div className="breakage-foot">
				<SelectField
					name="kind"
					label="What it puts right"
					options={[
						{ value: "price", label: "a price" },
						{ value: "quantity", label: "a quantity" },
						{ value: "goodwill", label: "nothing, it is goodwill" },
					]}
					defaultValue={typed?.kind ?? "price"}
					error={errorOf("kind")}
				/>
				<TextField
					name="reason"
					label="Why, as the store reads it"
					maxLength={500}
					defaultValue={typed?.reason}
					error={errorOf("reason")}
				/>
			</div>
			<table className="sheet-table stacked-rows credit-lines">
				<thead>
					<tr>
						<th scope="col">Product</th>
						<th scope="col">Left to credit</th>
						<th scope="col">Pieces at their price</th>
						<th scope="col">or an amount before tax</th>
					</tr>
				</thead>
				<tbody>
					{lines.map((line) => (
						<tr key={line.id}>
							<td>
								<span className="fig text-ink-faint">{line.code}</span> <span className="name">{line.name}</span>
								{line.detail && <span className="note block">{line.detail}</span>}
							</td>
							<td>
								<span className="money">{plainMoney(line.lineCents)}</span>
								<span className="note block">{line.pieces > 0 ? piecesWords(line.pieces) : "no pieces"}</span>
							</td>
							<td>
								<span className="note block desk:hidden" aria-hidden="true">
									pieces
								</span>
								<QuantityField
									name={`pieces-${line.id}`}
									label={`Pieces of ${line.name}`}
									defaultValue={typed?.[`pieces-${line.id}`]}
									error={errorOf(`pieces-${line.id}`)}
								/>
							</td>
							<td>
								<span className="note block desk:hidden" aria-hidden="true">
									or an amount
								</span>
								<QuantityField
									name={`amount-${line.id}`}
									className="wide"
									label={`Amount off ${line.name}`}
									inputMode="decimal"
									defaultValue={typed?.[`amount-${line.id}`]}
									error={errorOf(`amount-${line.id}`)}
								/>
							</td>
						</tr>
					))}
				</tbody>
			</table>
			<div className="breakage-foot">
				<TextField
					name="whole"
					label="An amount off the invoice as a whole"
					inputMode="decimal"
					autoComplete="off"
					hint={`For delivery or goodwill; no tax goes with it. ${formatMoney(leftCents)} of the invoice can still be credited.`}
					defaultValue={typed?.whole}
					error={errorOf("whole")}
				/>
				<p className="note">
					Sales tax goes back in the proportion of each line; local rules decide. A credit has its number for good and
					cannot be undone.
				</p>
				<div>
					<Button variant="primary" busy={isBusy} busyLabel="Issuing the credit">
						Issue the credit and tell {storeName}
					</Button>
				</div>
			</div>
		</Form>
	)
}
