import { Form } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { Button } from "~/ui/forms/button"
import { SelectField, TextField } from "~/ui/forms/fields"
import type { FieldOf } from "./store-terms-fields"

type Open = { id: string; number: string; dueOn: Day; openCents: number }
type GivenUp = { number: string; on: Day; cents: number }

/** Gives up what will not be paid any more, with the reason; what was given up before stands above. */
export function WriteOffForm({
	invoices,
	givenUp,
	writeOffId,
	field,
	isOpen,
}: {
	invoices: readonly Open[]
	givenUp: readonly GivenUp[]
	writeOffId: string
	field: FieldOf
	isOpen: boolean
}) {
	if (invoices.length === 0 && givenUp.length === 0) return null
	return (
		<section className="store-part" aria-labelledby="bad-debt-head">
			<h2 className="head-italic" id="bad-debt-head">
				Bad debts
			</h2>
			{givenUp.map((one) => (
				<p key={`${one.number} ${one.on} ${one.cents}`}>
					{formatMoney(one.cents)} of invoice {one.number} given up on {fullDay(one.on)}.
				</p>
			))}
			{invoices.length > 0 && (
				<details open={isOpen}>
					<summary className="cursor-pointer py-2 text-clover">Give up what will not be paid</summary>
					<Form
						method="post"
						noValidate
						aria-label="Give up a bad debt"
						className="store-fields mt-2"
						preventScrollReset
					>
						<input type="hidden" name="intent" value="write-off" />
						<input type="hidden" name="writeOffId" value={writeOffId} />
						<SelectField
							label="Invoice"
							options={[
								{ value: "", label: "Choose" },
								...invoices.map(({ id, number, dueOn, openCents }) => ({
									value: id,
									label: `${number}, ${formatMoney(openCents)}, due ${fullDay(dueOn)}`,
								})),
							]}
							{...field("invoiceId")}
						/>
						<TextField label="How much is given up, $" inputMode="decimal" autoComplete="off" {...field("givenUp")} />
						<TextField
							label="Why"
							autoComplete="off"
							hint="It stays with the invoice. Your bookkeeper decides how it is treated for tax."
							{...field("reason")}
						/>
						<div>
							<Button>Give it up</Button>
						</div>
					</Form>
				</details>
			)}
		</section>
	)
}
