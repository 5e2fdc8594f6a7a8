import { Form, Link, useNavigation } from "react-router"
import { plainMoney } from "~/domain/money"
import { Button } from "~/ui/forms/button"
import { FieldError, fieldId } from "~/ui/forms/field-error"
import { QuantityField } from "~/ui/forms/quantity-field"
import { FillStrip } from "~/ui/stock/fill-strip"

type Line = {
	id: string
	code: string
	name: string
	detail: string
	askedCases: number
	isToShare: boolean
	/** What sharing out has given it; null until then. */
	givenCases: number | null
	caseCents: number
	piecesPerCase: number
	mostCases: number
}

type ConfirmLinesProps = {
	order: { storeName: string; lines: readonly Line[] }
	/** Where it is explained how much of a product can be given. */
	whyHref: (code: string) => string
	/** Where a product is shared out among all who ask for it. */
	shareHref: (code: string) => string
	/** What was typed, by field, where it was refused. */
	values: Record<string, string>
	errors: Record<string, string>
}

/**
 * The lines of an order that waits: asked, how much of it there is, and a field for what each gets, filled with the most
 * that can be given. One button says what happens.
 */
export function ConfirmLines({ order, whyHref, shareHref, values, errors }: ConfirmLinesProps) {
	const isSending = useNavigation().formMethod === "POST"
	return (
		<Form method="post" noValidate>
			<table className="confirm-table stacked-rows">
				<thead>
					<tr>
						<th scope="col" className="no">
							No.
						</th>
						<th scope="col">Product</th>
						<th scope="col" className="num">
							Asked
						</th>
						<th scope="col">Can be given</th>
						<th scope="col" className="num">
							A case
						</th>
						<th scope="col" className="num">
							Given
						</th>
						<th scope="col" className="reason">
							Why less, if less
						</th>
					</tr>
				</thead>
				<tbody>
					{order.lines.map((line) => (
						<ConfirmLine
							key={line.id}
							line={line}
							whyHref={whyHref}
							shareHref={shareHref}
							values={values}
							errors={errors}
						/>
					))}
				</tbody>
			</table>
			<div className="flex flex-wrap items-center gap-4 px-4 py-4 desk:px-8">
				<Button variant="primary" size="big" name="intent" value="confirm" busy={isSending} busyLabel="Confirming">
					Confirm and tell {order.storeName}
				</Button>
			</div>
		</Form>
	)
}

function ConfirmLine({ line, whyHref, shareHref, values, errors }: { line: Line } & Omit<ConfirmLinesProps, "order">) {
	const { id, code, name, askedCases, givenCases, mostCases, isToShare } = line
	const given = `given-${id}`
	const reason = `reason-${id}`
	const errorId = `${fieldId(given)}-error`
	const reasonErrorId = `${fieldId(reason)}-error`
	return (
		<tr>
			<td className="no fig text-ink-faint">{code}</td>
			<td className="cell-product">
				<span className="name block text-body!">{name}</span>
				<span className="note">
					{line.detail}, case of {line.piecesPerCase}
					{isToShare && givenCases !== null && `, shared out: ${givenCases} of ${askedCases}`}
					{isToShare && givenCases === null && (
						<>
							, <Link to={shareHref(code)}>to be shared out</Link>
						</>
					)}
				</span>
			</td>
			<td className="num fig cell-asked">
				{askedCases} <span className="note desk:hidden">asked</span>
			</td>
			<td className="cell-can">
				<FillStrip
					size="sm"
					countsThrough
					runs={[
						{ state: "free", count: mostCases },
						{ state: "short", count: askedCases - mostCases },
					]}
					caption={
						mostCases < askedCases ? (
							<>
								{mostCases === 0 ? "none" : mostCases} of {askedCases},{" "}
								<span className="short">{askedCases - mostCases} short</span>.{" "}
								<Link to={whyHref(code)} aria-label={`Why so many of ${name}`}>
									Why
								</Link>
							</>
						) : (
							"all of it"
						)
					}
				/>
				{errors[given] && <FieldError id={errorId}>{errors[given]}</FieldError>}
			</td>
			<td className="money cell-price">{plainMoney(line.caseCents)}</td>
			<td className="num cell-given">
				<QuantityField
					name={given}
					label={`Cases of ${name} given`}
					defaultValue={values[given] ?? String(givenCases ?? mostCases)}
					error={errors[given]}
					errorId={errorId}
				/>
			</td>
			<td className="reason">
				<input
					className="input"
					type="text"
					id={fieldId(reason)}
					name={reason}
					aria-label={`Why ${name} is less than asked`}
					aria-invalid={errors[reason] ? true : undefined}
					aria-describedby={errors[reason] ? reasonErrorId : undefined}
					defaultValue={values[reason]}
					placeholder={mostCases < askedCases ? "The store reads this" : undefined}
					autoComplete="off"
				/>
				{errors[reason] && <FieldError id={reasonErrorId}>{errors[reason]}</FieldError>}
			</td>
		</tr>
	)
}
