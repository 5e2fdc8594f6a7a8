import { useState } from "react"
import { formatMoney, plainMoney } from "~/domain/money"
import { lineAmount, readNetWeight } from "~/domain/pricing/weighed-line"
import { exactWeightWords, weightWords } from "~/domain/weight"
import { describedBy, FieldError, fieldId } from "~/ui/forms/field-error"

/** What was typed for the weights of one order, and why it was refused, by field. */
export type WeighPosted = {
	values: Record<string, string>
	errors: Record<string, string>
	sure: Record<string, number>
}

type WeighedLine = {
	id: string
	code: string
	productName: string
	cases: number
	byWeight: { poundCents: number; usualGrams: number; weighedGrams: number | null }
}

/** What was weighed of a line that is packed, and the price that follows. */
export function WeighedPrice({ line }: { line: WeighedLine }) {
	const { poundCents, weighedGrams } = line.byWeight
	if (weighedGrams === null) return <span className="short font-semibold">not weighed</span>
	const { cents } = lineAmount({ cases: line.cases, caseCents: 0, poundCents, weighedGrams })
	return (
		<span>
			weighed {exactWeightWords(weighedGrams)} at {plainMoney(poundCents)} a lb, <b>{formatMoney(cents)}</b>
		</span>
	)
}

/**
 * Asks the net weight of a line that is priced by weight, and says what it comes to as it is typed. `form` is the form that
 * packs the order. Where a weight was doubted, a tick says that this very weight is right.
 */
export function WeighField({ line, form, posted }: { line: WeighedLine; form: string; posted: WeighPosted | null }) {
	const name = `weight-${line.id}`
	const id = fieldId(name)
	const error = posted?.errors[name]
	const doubted = posted?.sure[name]
	const [typed, setTyped] = useState(posted?.values[name] ?? "")
	const { poundCents, usualGrams } = line.byWeight
	const read = readNetWeight(typed)
	return (
		<div className="field basis-full py-1">
			<label className="field-label" htmlFor={id}>
				Net weight of {line.code} {line.productName}
			</label>
			<input
				className="input max-w-56"
				type="text"
				id={id}
				name={name}
				form={form}
				autoComplete="off"
				placeholder="9 lb 12 oz"
				defaultValue={typed}
				onInput={(event) => setTyped(event.currentTarget.value)}
				aria-invalid={error ? true : undefined}
				aria-describedby={describedBy(`${id}-hint`, error && `${id}-error`)}
			/>
			<span className="field-hint" id={`${id}-hint`} aria-live="polite">
				{read.ok
					? `${exactWeightWords(read.grams)} at ${plainMoney(poundCents)} a lb is ${formatMoney(lineAmount({ cases: line.cases, caseCents: 0, poundCents, weighedGrams: read.grams }).cents)}.`
					: `In lb and oz, or in g. By the label ${weightWords(usualGrams)}; ${plainMoney(poundCents)} a lb.`}
			</span>
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
			{doubted !== undefined && (
				<div className="check">
					<input type="checkbox" id={`${id}-sure`} name={`sure-${line.id}`} form={form} value={doubted} />
					<label htmlFor={`${id}-sure`}>It is right: {exactWeightWords(doubted)}</label>
				</div>
			)}
		</div>
	)
}
