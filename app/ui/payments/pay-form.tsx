import { Form } from "react-router"
import { type Day, dayWords, shortDay, shortMonthDay } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { Button } from "~/ui/forms/button"
import { QuantityField } from "~/ui/forms/quantity-field"

export type PayLine = {
	number: string
	dueOn: Day
	openCents: number
	onItsWayCents: number
	discountCents: number
	discountUntil: Day | null
	leftCents: number
}

type PayFormProps = {
	lines: readonly PayLine[]
	/** The invoices that are ticked to begin with. */
	ticked: readonly string[]
	values: Record<string, string> | undefined
	errors: readonly { field?: string; message: string }[]
	keptWords: string
	isLeaving: boolean
}

/** What a store pays in one visit: its open invoices with a tick and an amount each, and how it pays. */
export function PayForm({ lines, ticked, values, errors, keptWords, isLeaving }: PayFormProps) {
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	const hasDiscount = lines.some(({ discountCents }) => discountCents > 0)
	return (
		<Form method="post" noValidate aria-label="Pay">
			<table className="sheet-table pay-lines">
				<caption className="sr-only">Invoices to pay</caption>
				<thead>
					<tr>
						<th scope="col">Pay</th>
						<th scope="col">Due</th>
						<th scope="col" className="num max-desk:hidden">
							Still open
						</th>
						<th scope="col" className="num pr-4! desk:pr-8!">
							Pay now
						</th>
					</tr>
				</thead>
				<tbody>
					{lines.map((line) => (
						<tr key={line.number}>
							<td>
								<label className="flex items-center gap-3 py-1">
									<input
										type="checkbox"
										className="size-5 accent-clover"
										name="invoice"
										value={line.number}
										disabled={line.leftCents === 0}
										defaultChecked={ticked.includes(line.number) && line.leftCents > 0}
									/>
									<span className="fig whitespace-nowrap">{line.number}</span>
								</label>
							</td>
							<td>
								<span className="max-desk:hidden">{dayWords(line.dueOn)}</span>
								<span className="desk:hidden">
									{shortDay(line.dueOn).split(" ")[0]}, {shortMonthDay(line.dueOn)}
								</span>
								<span className="note block desk:hidden">{formatMoney(line.openCents)} open</span>
								<LineNote line={line} />
							</td>
							<td className="money max-desk:hidden">{plainMoney(line.openCents)}</td>
							<td className="pr-4! text-right desk:pr-8!">
								{line.leftCents === 0 ? (
									<span className="note">nothing</span>
								) : (
									<QuantityField
										name={`cents-${line.number}`}
										className="wide"
										label={`Pay now of invoice ${line.number}`}
										inputMode="decimal"
										autoComplete="off"
										defaultValue={values?.[`cents-${line.number}`] ?? plainMoney(line.leftCents)}
										error={errorOf(`cents-${line.number}`)}
									/>
								)}
							</td>
						</tr>
					))}
				</tbody>
			</table>
			<div className="pay-foot">
				<fieldset>
					<legend className="field-label">Pay by</legend>
					<Way value="card" words="card" chosen={values?.method ?? "card"} />
					<Way
						value="bank-debit"
						words="bank debit: it is on its way for some days until your bank has cleared it"
						chosen={values?.method ?? "card"}
					/>
				</fieldset>
				<p className="note">
					{hasDiscount &&
						"The discount is taken off where you pay all the rest in time; a bank debit counts on the day you start it. "}
					{keptWords !== "" && `The page of the payment service offers your ${keptWords}. `}
					Card and account numbers are typed on the page of the payment service; we never see them.
				</p>
				<Button variant="primary" size="big" name="intent" value="pay" busy={isLeaving} busyLabel="Opening the page">
					Go on to the payment page
				</Button>
			</div>
		</Form>
	)
}

function Way({ value, words, chosen }: { value: string; words: string; chosen: string }) {
	return (
		<label className="flex items-start gap-3 py-1">
			<input
				type="radio"
				className="mt-1 size-5 shrink-0 accent-clover"
				name="method"
				value={value}
				defaultChecked={value === chosen}
			/>
			<span>{words}</span>
		</label>
	)
}

function LineNote({ line }: { line: PayLine }) {
	const { onItsWayCents, discountCents, discountUntil } = line
	if (onItsWayCents > 0) return <span className="note block">{formatMoney(onItsWayCents)} on its way</span>
	if (discountCents === 0 || !discountUntil) return null
	return (
		<span className="note block">
			{formatMoney(discountCents)} off until {shortMonthDay(discountUntil)}
		</span>
	)
}
