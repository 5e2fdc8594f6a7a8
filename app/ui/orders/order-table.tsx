import type { ReactNode } from "react"
import { FieldError, fieldId } from "~/ui/forms/field-error"
import { QuantityField, type QuantityFieldProps } from "~/ui/forms/quantity-field"

/** "1 or 2 cases": two short lines of a table head. */
type TwoLines = readonly [string, string]

type OrderTableProps = {
	/** The case breaks of the store's prices, lowest first: ["1 or 2", "cases"]. */
	breaks: readonly TwoLines[]
	/** The delivery day in words: "August 18". */
	day: string
	/** The rows, `OrderRow`s. */
	children: ReactNode
}

const twoLines = (lines: TwoLines) => (
	<>
		{lines[0]}
		<br />
		{lines[1]}
	</>
)

/** The order sheet of a store: rows are products, one field per row. Stands on a ruled sheet. */
export function OrderTable({ breaks, day, children }: OrderTableProps) {
	return (
		<table className="order-table stacked-rows">
			<thead>
				<tr>
					<th className="no">No.</th>
					<th>Product</th>
					<th className="pieces">{twoLines(["Pieces,", "case weight"])}</th>
					{breaks.map((lines) => (
						<th key={lines.join(" ")} className="break">
							{twoLines(lines)}
						</th>
					))}
					<th className="stock">{twoLines(["Free to promise", `for ${day}`])}</th>
					<th className="num last">{twoLines(["Last", "time"])}</th>
					<th className="num">{twoLines(["This order,", "cases"])}</th>
					<th className="num amount">Amount</th>
					<th className="margin">
						<span className="sr-only">Notes</span>
					</th>
				</tr>
			</thead>
			<tbody>{children}</tbody>
		</table>
	)
}

/** On a phone only the price in force is kept, also where nothing is asked yet. */
function breakClass(isInForce: boolean, isChosen: boolean): string {
	if (!isInForce) return "break"
	return isChosen ? "break on" : "break max-desk:[display:block]! max-desk:[grid-area:1/2]!"
}

type OrderRowProps = {
	no: ReactNode
	name: string
	/** Grade and weight of one piece: "Fancy, 8 oz". */
	detail: string
	/** Pieces in a case, and what the case weighs: "6 lb". */
	pieces: number
	caseWeight: string
	/** Prices of a case, in the order of the table's breaks; `on` is the one in force, `isChosen` where the row has cases. */
	prices: readonly { price: string; on: boolean; isChosen: boolean }[]
	/** A fill strip with its words. */
	stock: ReactNode
	lastTime?: ReactNode
	/** The field for cases; its label is made from name and detail, and its error stands beside it, under the stock. */
	quantity?: Omit<QuantityFieldProps, "label" | "errorId">
	/** A small second figure under the field: the least that would be taken. */
	least?: ReactNode
	/** Stands in the place of the field past the cut-off. */
	figure?: ReactNode
	amount?: ReactNode
	/** The reason, in the margin. */
	note?: ReactNode
	/** It cannot be ordered for this day. */
	off?: boolean
}

/** One product of the order sheet. On a phone it keeps product, strip, the price in force and the field. */
export function OrderRow({ name, detail, pieces, caseWeight, prices, stock, quantity, ...row }: OrderRowProps) {
	const errorId = quantity && `${quantity.id ?? fieldId(quantity.name)}-error`
	return (
		<tr className={row.off ? "off" : undefined}>
			<td className="no">{row.no}</td>
			<td className="product">
				<span className="name">{name}</span>
				<span className="note">{detail}</span>
			</td>
			<td className="pieces whitespace-nowrap">
				{pieces}
				<span className="note">, {caseWeight}</span>
			</td>
			{prices.map(({ price, on, isChosen }, index) => (
				// biome-ignore lint/suspicious/noArrayIndexKey: columns keep their order, and two may show the same price
				<td key={index} className={breakClass(on, isChosen)}>
					<span>{price}</span>
				</td>
			))}
			<td className="stock">
				{stock}
				{/* As wide as the strip and no wider: the columns keep their places when something is wrong. */}
				{quantity?.error && errorId && (
					<span className="block w-0 min-w-full">
						<FieldError id={errorId}>{quantity.error}</FieldError>
					</span>
				)}
			</td>
			<td className="num fig last">{row.lastTime}</td>
			<td className="num field-cell fig">
				{quantity ? (
					<QuantityField {...quantity} label={`Cases of ${name}, ${detail}`} errorId={errorId} />
				) : (
					row.figure
				)}
				{row.least}
			</td>
			<td className="money amount">{row.amount}</td>
			<td className="margin aside">{row.note}</td>
		</tr>
	)
}
