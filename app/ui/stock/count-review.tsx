import { Form, Link } from "react-router"
import { Button } from "~/ui/forms/button"
import { FieldError, fieldId } from "~/ui/forms/field-error"
import { QuantityField } from "~/ui/forms/quantity-field"
import { differenceWords } from "./difference-words"

/** A lot that was counted, beside the ledger. */
type ReviewedLot = {
	lotId: string
	code: string
	productName: string
	detail: string
	counted: number
	ledger: number
	missing: number
}

type CountReviewProps = {
	lots: readonly ReviewedLot[]
	/** The form's own key, so that it is posted once. */
	idempotencyKey: string
	values: Record<string, string>
	errors: Record<string, string>
	/** Back to an empty sheet. */
	sheetHref: string
}

/** What a count differs by, before it is posted: each figure can still be mended, and each difference given a reason. */
export function CountReview({ lots, idempotencyKey, values, errors, sheetHref }: CountReviewProps) {
	const differing = lots.filter((lot) => lot.counted !== lot.ledger)
	const same = lots.length - differing.length
	return (
		<Form method="post" noValidate>
			<input type="hidden" name="key" value={idempotencyKey} />
			<table className="confirm-table stacked-rows">
				<thead>
					<tr>
						<th scope="col" className="lot">
							Lot
						</th>
						<th scope="col">Product</th>
						<th scope="col" className="num">
							In the ledger
						</th>
						<th scope="col" className="num">
							Counted
						</th>
						<th scope="col">What is posted</th>
						<th scope="col" className="reason">
							Why, if you know
						</th>
					</tr>
				</thead>
				<tbody>
					{[...differing, ...lots.filter((lot) => lot.counted === lot.ledger)].map((lot) => (
						<ReviewRow key={lot.lotId} lot={lot} values={values} errors={errors} />
					))}
				</tbody>
			</table>
			<div className="flex flex-wrap items-center gap-4 px-4 py-4 desk:px-8">
				<Button variant="primary" size="big" name="intent" value="post">
					{differing.length === 0
						? `Post the count of ${lots.length === 1 ? "one lot" : `${lots.length} lots`}: nothing differs`
						: `Post ${differing.length === 1 ? "one difference" : `${differing.length} differences`}`}
				</Button>
				<Button name="intent" value="compare">
					Compare again
				</Button>
				<Link className="py-1" to={sheetHref}>
					Start over
				</Link>
				{same > 0 && differing.length > 0 && (
					<span className="note">
						{same === 1 ? "One lot agrees" : `${same} lots agree`} and {same === 1 ? "is" : "are"} recorded as counted.
					</span>
				)}
			</div>
		</Form>
	)
}

function ReviewRow({ lot, values, errors }: { lot: ReviewedLot } & Pick<CountReviewProps, "values" | "errors">) {
	const count = `count-${lot.lotId}`
	const reason = `reason-${lot.lotId}`
	const differs = lot.counted !== lot.ledger
	return (
		<tr>
			<td className="lot fig max-desk:hidden">{lot.code}</td>
			<td className="cell-product">
				<span className="fig desk:hidden">{lot.code}</span> {lot.productName}
				<span className="note block">{lot.detail}</span>
			</td>
			<td className="num fig cell-asked">
				{lot.ledger} <span className="note desk:hidden">in the ledger</span>
				<input type="hidden" name={`compared-${lot.lotId}`} value={`${lot.ledger} ${lot.counted}`} />
			</td>
			<td className="num cell-given">
				<QuantityField
					name={count}
					label={`Pieces of lot ${lot.code} counted`}
					defaultValue={values[count] || String(lot.counted)}
					error={errors[count]}
				/>
			</td>
			<td className="cell-can">{differenceWords(lot)}</td>
			<td className="reason">
				{differs && (
					<input
						className="input"
						type="text"
						id={fieldId(reason)}
						name={reason}
						aria-label={`Why lot ${lot.code} differs`}
						aria-invalid={errors[reason] ? true : undefined}
						aria-describedby={errors[reason] ? `${fieldId(reason)}-error` : undefined}
						defaultValue={values[reason]}
						autoComplete="off"
					/>
				)}
				{errors[reason] && <FieldError id={`${fieldId(reason)}-error`}>{errors[reason]}</FieldError>}
			</td>
		</tr>
	)
}
