import { memo } from "react"
import type { Day } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"
import { writeSeenPrice } from "~/domain/orders/seen-price"
import { labelledTotalWords } from "~/domain/weight"
import { FillStrip } from "~/ui/stock/fill-strip"
import { LeastField } from "./least-field"
import { OrderRow } from "./order-table"
import { type BreakColumn, casesName, columnInForce, leastName, type PricedRow, priceInColumn } from "./price-sheet"
import type { RowNote } from "./row-note"
import { stripWords } from "./strip-words"

type SheetRowProps = {
	row: PricedRow
	columns: readonly BreakColumn[]
	today: Day
	isClosed: boolean
	value: string
	error: string | undefined
	note: RowNote
	/** The field for the least stands in the row, with what it begins with. */
	showsLeast: boolean
	least: string
	leastError: string | undefined
}

/** What it is, and of comb priced by weight what a pound costs: the price of a case is then about what it comes to. */
function rowDetail({ product, line }: PricedRow): string {
	const poundCents = product.breaks[line?.breakIndex ?? 0]?.poundCents ?? null
	if (poundCents === null) return product.detail
	return [product.detail, `about; ${plainMoney(poundCents)} a lb as weighed`].filter(Boolean).join(", ")
}

/** One product of the sheet: its prices, what is free of it, the field, and what that comes to. */
function Row({ row, columns, today, isClosed, value, error, note, ...least }: SheetRowProps) {
	const { product, line } = row
	const { strip } = product
	const inForce = columnInForce(columns, row)
	const shown = strip.freeCases > 0 || !strip.next ? strip : { free: 0, held: 0, expected: strip.next.quantity }
	const hasField = !isClosed
	return (
		<OrderRow
			no={product.code}
			name={product.name}
			detail={rowDetail(row)}
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
				hasField
					? {
							name: casesName(product.productId),
							defaultValue: value,
							disabled: !product.mayAsk && value === "",
							error,
							// The digit that is typed first replaces what stands there.
							onFocus: (event) => event.currentTarget.select(),
						}
					: undefined
			}
			least={
				hasField && (
					<>
						{/* What was seen goes with the order: another price is asked about, never applied in silence. */}
						<input type="hidden" name={`seen-${product.productId}`} value={writeSeenPrice(product)} />
						{least.showsLeast && (
							<LeastField
								name={leastName(product.productId)}
								label={`Least you would take of ${product.name}, ${product.detail}`}
								defaultValue={least.least}
								error={least.leastError}
							/>
						)}
					</>
				)
			}
			figure={product.orderedCases || null}
			amount={
				line && !isClosed ? (
					<>
						{row.sharedCases > 0 && <i>up to </i>}
						{plainMoney(line.cents)}
					</>
				) : null
			}
			note={isClosed ? null : note.node}
			off={!product.mayAsk && !product.orderedCases}
		/>
	)
}

/** Drawn anew only when something else stands in it: a key typed in one row leaves the other hundreds alone. */
export const SheetRow = memo(
	Row,
	(before, after) =>
		before.note.key === after.note.key &&
		(Object.keys(after) as (keyof SheetRowProps)[]).every((name) => name === "note" || before[name] === after[name]),
)
