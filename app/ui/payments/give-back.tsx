import { Form, useNavigation } from "react-router"
import type { Day } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"

type Typed = {
	values: Record<string, string> | undefined
	errors: readonly { field?: string; message: string }[]
}

const errorIn = (errors: Typed["errors"]) => (field: string) => errors.find((error) => error.field === field)?.message

/** Gives part of a payment back through Stripe, or all that is left. */
export function RefundForm({
	returnId,
	refundableCents,
	method,
	values,
	errors,
}: Typed & { returnId: string; refundableCents: number; method: string }) {
	const errorOf = errorIn(errors)
	const isBusy = useNavigation().formMethod === "POST"
	return (
		<Form method="post" className="give-back" noValidate aria-label="Refund">
			<h2 className="head-italic">Give it back</h2>
			<input type="hidden" name="returnId" value={values?.returnId ?? returnId} />
			<TextField
				name="amount"
				label="How much goes back"
				inputMode="decimal"
				autoComplete="off"
				hint={`At most ${formatMoney(refundableCents)}, to the ${method} that paid. What it settled is open again by so much.`}
				defaultValue={values?.amount ?? plainMoney(refundableCents)}
				error={errorOf("amount")}
			/>
			<TextField
				name="reason"
				label="Why"
				maxLength={300}
				autoComplete="off"
				defaultValue={values?.reason ?? ""}
				error={errorOf("reason")}
			/>
			<div>
				<Button name="intent" value="refund" busy={isBusy} busyLabel="Giving it back">
					Refund through Stripe
				</Button>
			</div>
		</Form>
	)
}

/** Notes that a payment by hand did not hold: a check that bounced, or a wrong amount that is entered anew. */
export function BounceForm({ isCheck, today, values, errors }: Typed & { isCheck: boolean; today: Day }) {
	const errorOf = errorIn(errors)
	return (
		<Form method="post" className="give-back" noValidate aria-label="It did not hold">
			<h2 className="head-italic">{isCheck ? "It bounced, or was noted wrong" : "It was noted wrong"}</h2>
			<TextField
				name="bouncedOn"
				type="date"
				label="On"
				max={today}
				hint="What it settled is open again from this day. A wrong amount: take it back here, then note the right one."
				defaultValue={values?.bouncedOn ?? today}
				error={errorOf("bouncedOn")}
			/>
			<TextField
				name="note"
				label="What happened"
				maxLength={300}
				autoComplete="off"
				defaultValue={values?.note ?? ""}
				error={errorOf("note")}
			/>
			<div>
				<Button name="intent" value="bounce">
					Take it back
				</Button>
			</div>
		</Form>
	)
}
