import type { ReactNode } from "react"
import { Form } from "react-router"
import type { Day } from "~/domain/calendar"
import { Button } from "~/ui/forms/button"
import { SelectField, TextField } from "~/ui/forms/fields"

type NotePaymentProps = {
	paymentId: string
	today: Day
	/** What the amount begins with. */
	amount: string
	amountHint: ReactNode
	values: Record<string, string> | undefined
	errors: readonly { field?: string; message: string }[]
	/** Between the fields and the button: where the money goes. */
	children?: ReactNode
}

/** A payment that came by check, in cash or by transfer, as it is noted by hand. */
export function NotePayment({ paymentId, today, amount, amountHint, values, errors, children }: NotePaymentProps) {
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	return (
		<Form method="post" className="payment-form hand-payment" noValidate aria-label="Note a payment">
			<input type="hidden" name="paymentId" value={values?.paymentId ?? paymentId} />
			<SelectField
				name="method"
				label="Money came as"
				options={[
					{ value: "cheque", label: "a check" },
					{ value: "cash", label: "cash" },
					{ value: "transfer", label: "a bank transfer" },
				]}
				defaultValue={values?.method ?? "cheque"}
				error={errorOf("method")}
			/>
			<TextField
				name="amount"
				label="How much"
				inputMode="decimal"
				autoComplete="off"
				hint={amountHint}
				defaultValue={values?.amount ?? amount}
				error={errorOf("amount")}
			/>
			<TextField
				name="receivedOn"
				type="date"
				label="It came on"
				max={today}
				defaultValue={values?.receivedOn ?? today}
				error={errorOf("receivedOn")}
			/>
			<TextField
				name="reference"
				label="Number or words"
				hint="The number of a check, the words of a transfer; may stay empty."
				maxLength={100}
				autoComplete="off"
				defaultValue={values?.reference ?? ""}
				error={errorOf("reference")}
			/>
			{children}
			<div className="payment-button">
				<Button variant="primary" name="intent" value="note">
					Note the payment
				</Button>
			</div>
		</Form>
	)
}
