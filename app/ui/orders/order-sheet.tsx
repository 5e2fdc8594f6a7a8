import { type ReactNode, useEffect, useRef, useState } from "react"
import { Form, useNavigation } from "react-router"
import { type Day, monthDay } from "~/domain/calendar"
import type { DeliveryTerms } from "~/domain/pricing/price-order"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"
import { OrderTable } from "./order-table"
import { breakColumns, casesName, priceSheet, type SheetProduct } from "./price-sheet"
import { RowNote } from "./row-note"
import { MinimumNote, SheetKeys, SheetTotals } from "./sheet-foot"
import { SheetRow } from "./sheet-row"
import { useSheetKeys } from "./use-sheet-keys"

export type OrderSheetProps = {
	day: Day
	today: Day
	products: readonly SheetProduct[]
	terms: DeliveryTerms
	/** Past last orders: what was ordered stands in plain figures. */
	isClosed: boolean
	/** Where the order is sent, when that is not this page. */
	action?: string
	idempotencyKey: string
	/** What was typed and could not be taken, by field name. */
	values: Readonly<Record<string, string>>
	/** What is wrong, by field name. */
	errors: Readonly<Record<string, string>>
	sendLabel: ReactNode
}

/** What was typed, by product id. */
function typedOf(products: readonly SheetProduct[], read: (name: string) => string): Record<string, string> {
	return Object.fromEntries(products.map(({ productId }) => [productId, read(casesName(productId))]))
}

/** The order sheet as a form: it works as it stands, and counts along, hints and takes keys once the script is there. */
export function OrderSheet(props: OrderSheetProps) {
	const { products, terms, values, errors, isClosed } = props
	const form = useRef<HTMLFormElement>(null)
	const [typed, setTyped] = useState(() => typedOf(products, (name) => values[name] ?? ""))
	const isSending = useNavigation().formMethod === "POST"
	const readForm = () => {
		if (!form.current) return
		const data = new FormData(form.current)
		setTyped(typedOf(products, (name) => String(data.get(name) ?? "")))
	}
	// What was typed before the script came, or kept by the browser over Back, counts too.
	// biome-ignore lint/correctness/useExhaustiveDependencies: once, when the form is there
	useEffect(readForm, [])

	const sheet = priceSheet(products, typed, terms)
	const rowOf = (productId: string) => sheet.rows.find((row) => row.product.productId === productId)
	const onKeyDown = useSheetKeys(form, {
		b: (productId) => {
			const row = rowOf(productId)
			if (!row) return null
			if (!row.line) return 1
			return row.line.nextBreak ? row.cases + row.line.nextBreak.addCases : null
		},
		l: (productId) => rowOf(productId)?.product.lastCases ?? null,
	})
	const columns = breakColumns(products)

	const table = (
		<OrderTable breaks={columns.map((column) => column.head)} day={monthDay(props.day)}>
			{sheet.rows.map((row) => (
				<SheetRow
					key={row.product.productId}
					row={row}
					columns={columns}
					today={props.today}
					isClosed={isClosed}
					value={values[casesName(row.product.productId)] ?? ""}
					error={errors[casesName(row.product.productId)]}
					note={
						<RowNote
							row={row}
							sheet={sheet}
							products={products}
							typed={typed}
							terms={terms}
							hasError={errors[casesName(row.product.productId)] !== undefined}
							isKept={values[`keep-${row.product.productId}`] !== undefined}
						/>
					}
				/>
			))}
		</OrderTable>
	)
	if (isClosed) return table
	return (
		<Form method="post" action={props.action} ref={form} onInput={readForm} onKeyDown={onKeyDown} noValidate>
			<input type="hidden" name="idempotencyKey" value={props.idempotencyKey} />
			{/* Should the session end before it is sent, the page that keeps the order names its lines by these. */}
			{products.map(({ productId, code, name, detail }) => (
				<input
					key={productId}
					type="hidden"
					name={`label-${casesName(productId)}`}
					value={`${code} ${name}, ${detail}, cases`}
				/>
			))}
			{table}
			<div className="order-foot">
				<div>
					<SheetKeys />
					<details className="mt-3" open={Boolean(errors.poNumber || errors.note || values.poNumber || values.note)}>
						<summary className="py-1 font-semibold text-clover">Add your order number or a note</summary>
						<div className="mt-2 grid gap-3">
							<TextField
								name="poNumber"
								label="Your order number"
								defaultValue={values.poNumber}
								error={errors.poNumber}
								autoComplete="off"
							/>
							<TextField
								name="note"
								label="A note with the order"
								defaultValue={values.note}
								error={errors.note}
								autoComplete="off"
							/>
						</div>
					</details>
				</div>
				<SheetTotals sheet={sheet} />
				<div className="grid content-start gap-2">
					<Button variant="primary" size="big" className="w-full" busy={isSending} busyLabel="Sending">
						{props.sendLabel}
					</Button>
					<MinimumNote sheet={sheet} terms={terms} />
				</div>
			</div>
		</Form>
	)
}
