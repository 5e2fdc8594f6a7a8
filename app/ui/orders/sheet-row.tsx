import type { ReactNode } from "react"
import type { Day } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"
import { labelledTotalWords } from "~/domain/weight"
import { FillStrip } from "~/ui/stock/fill-strip"
import { OrderRow } from "./order-table"
import { type BreakColumn, casesName, columnInForce, type PricedRow, priceInColumn } from "./price-sheet"
import { stripWords } from "./strip-words"

type SheetRowProps = {
	row: PricedRow
	columns: readonly BreakColumn[]
	today: Day
	isClosed: boolean
	value: string
	error: string | undefined
	note: ReactNode
}

/** One product of the sheet: its prices, what is free of it, the field, and what that comes to. */
export function SheetRow({ row, columns, today, isClosed, value, error, note }: SheetRowProps) {
	const { product, line, isBeyondFree } = row
	const { strip } = product
	const inForce = columnInForce(columns, row)
	const shown = strip.freeCases > 0 || !strip.next ? strip : { free: 0, held: 0, expected: strip.next.quantity }
	return (
		<OrderRow
			no={product.code}
			name={product.name}
			detail={product.detail}
			pieces={product.piecesPerCase}
			caseWeight={labelledTotalWords([{ labelledGrams: product.pieceNetGrams, pieces: product.piecesPerCase }])}
			prices={columns.map((column, index) => ({
				price: plainMoney(priceInColumn(product.breaks, column)),
				on: index === inForce,
				isChosen: line !== null,
			}))}
			// Nothing can be promised any more for a day that is closed.
			stock={
				isClosed ? null : (
					<FillStrip
						size="sm"
						runs={[
							{ state: "free", count: shown.free },
							{ state: "held", count: shown.held },
							{ state: "expected", count: shown.expected },
						]}
						caption={stripWords(product, today)}
					/>
				)
			}
			lastTime={product.lastCases || null}
			quantity={
				isClosed
					? undefined
					: {
							name: casesName(product.productId),
							defaultValue: value,
							disabled: !product.mayAsk && value === "",
							error,
							// The digit that is typed first replaces what stands there.
							onFocus: (event) => event.currentTarget.select(),
						}
			}
			figure={product.orderedCases || null}
			amount={
				line && !isClosed ? (
					<>
						{isBeyondFree && <i>up to </i>}
						{plainMoney(line.lineCents)}
					</>
				) : null
			}
			note={isClosed ? null : note}
			off={!product.mayAsk && !product.orderedCases}
		/>
	)
}
