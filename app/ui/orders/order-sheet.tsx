import { type ReactNode, useEffect, useMemo, useRef, useState } from "react"
import { Form, useNavigation } from "react-router"
import { type Day, monthDay } from "~/domain/calendar"
import type { UnmatchedRow } from "~/domain/orders/read-columns"
import type { DeliveryTerms } from "~/domain/pricing/price-order"
import { Button, ButtonLink } from "~/ui/forms/button"
import { MendRows } from "./mend-rows"
import { OrderTable } from "./order-table"
import {
	breakColumns,
	casesName,
	keepName,
	keepRows,
	leastName,
	type PricedRow,
	priceSheet,
	type SheetProduct,
} from "./price-sheet"
import { rowNote } from "./row-note"
import { MinimumNote, SheetKeys, SheetTotals } from "./sheet-foot"
import { SheetRow } from "./sheet-row"
import { SheetList, SheetWords } from "./sheet-words"
import { useKeptSheet } from "./use-kept-sheet"
import { useSheetKeys } from "./use-sheet-keys"
import { useSheetPaste } from "./use-sheet-paste"

export type OrderSheetProps = {
	day: Day
	today: Day
	products: readonly SheetProduct[]
	terms: DeliveryTerms
	/** Past last orders: what was ordered stands in plain figures. */
	isClosed: boolean
	/** The path of the sheets, to which a day is added. */
	sheetPath: string
	/** Where the order is sent, when that is not this page. */
	action?: string
	/** An order that is there already is changed: nothing half-filled is kept of it. */
	isChange: boolean
	idempotencyKey: string
	/** What the fields begin with, by field name. */
	values: Readonly<Record<string, string>>
	/** What is wrong, by field name. */
	errors: Readonly<Record<string, string>>
	/** Rows of a list that name no product. */
	unmatched: readonly UnmatchedRow[]
	/** Days that have what this one has not, by product. */
	elsewhere: Readonly<Record<string, readonly Day[]>>
	/** A field for the least of every line. */
	showsLeast: boolean
	sendLabel: ReactNode
}

/** Fields by name, as they were begun with or as they stand in the form. */
type Typed = Readonly<Record<string, string>>

function textsOf(form: HTMLFormElement): Typed {
	return Object.fromEntries(
		[...new FormData(form)].flatMap(([name, value]) => (typeof value === "string" ? [[name, value]] : [])),
	)
}

const sameFields = (a: Typed, b: Typed) => JSON.stringify(a) === JSON.stringify(b)

/** The order sheet as a form: it works as it stands, and counts along, hints and takes keys once the script is there. */
export function OrderSheet(props: OrderSheetProps) {
	const { products, terms, values, errors, isClosed, elsewhere } = props
	const form = useRef<HTMLFormElement>(null)
	const [typed, setTyped] = useState<Typed>(values)
	const [pasted, setPasted] = useState<readonly UnmatchedRow[] | null>(null)
	const [open, setOpen] = useState<readonly string[]>([])
	const isSending = useNavigation().formMethod === "POST"
	const path = `${props.sheetPath}/${props.day}`
	const kept = useKeptSheet(form, { isOn: !props.isChange && !props.action, path })
	const readForm = () => {
		const fresh = form.current && textsOf(form.current)
		if (fresh) setTyped((before) => (sameFields(before, fresh) ? before : fresh))
	}
	// What was typed before the script came, or kept by the browser over Back, counts too.
	useEffect(readForm, [])
	useEffect(() => {
		const last = open.at(-1)
		const field = last && form.current?.elements.namedItem(leastName(last))
		if (field instanceof HTMLInputElement) field.focus()
	}, [open])

	const drawn = useRef<readonly PricedRow[]>([])
	const columns = useMemo(() => breakColumns(products), [products])
	const sheet = useMemo(() => {
		const fresh = priceSheet(products, typed, terms)
		return { ...fresh, rows: keepRows(drawn.current, fresh.rows) }
	}, [products, typed, terms])
	drawn.current = sheet.rows
	const rowOf = (productId: string) => sheet.rows.find((row) => row.product.productId === productId)
	const onKeyDown = useSheetKeys(form, {
		rowKeys: {
			b: (productId) => {
				const row = rowOf(productId)
				if (!row) return null
				if (!row.line) return 1
				return row.line.nextBreak ? row.cases + row.line.nextBreak.addCases : null
			},
			l: (productId) => rowOf(productId)?.product.lastCases ?? null,
		},
		openLeast: (productId) => setOpen((before) => [...before.filter((one) => one !== productId), productId]),
	})
	const changed = () => {
		readForm()
		kept.changed()
	}
	const onPaste = useSheetPaste(form, {
		products,
		onFilled: (unmatched) => {
			setPasted(unmatched)
			changed()
		},
	})

	const table = (
		<OrderTable breaks={columns.map((column) => column.head)} day={monthDay(props.day)}>
			{sheet.rows.map((row) => {
				const { productId } = row.product
				const least = values[leastName(productId)] ?? ""
				return (
					<SheetRow
						key={productId}
						row={row}
						columns={columns}
						today={props.today}
						isClosed={isClosed}
						value={values[casesName(productId)] ?? ""}
						error={errors[casesName(productId)]}
						showsLeast={props.showsLeast || least !== "" || open.includes(productId)}
						least={least}
						leastError={errors[leastName(productId)]}
						note={rowNote({
							row,
							sheet,
							products,
							typed,
							terms,
							keep: values[keepName(productId)],
							hasError: errors[casesName(productId)] !== undefined,
							sheetPath: props.sheetPath,
							elsewhere: elsewhere[productId] ?? [],
						})}
					/>
				)
			})}
		</OrderTable>
	)
	if (isClosed) return table
	return (
		<Form
			method="post"
			action={props.action}
			ref={form}
			onInput={changed}
			onKeyDown={onKeyDown}
			onPaste={onPaste}
			onSubmit={kept.forget}
			noValidate
		>
			{/* Enter sends the order, whatever other buttons stand above the one that does. */}
			<button type="submit" hidden />
			<input type="hidden" name="idempotencyKey" value={props.idempotencyKey} />
			{props.showsLeast && <input type="hidden" name="showsLeast" value="yes" />}
			{/* Should the session end before it is sent, the page that keeps the order names its lines by these. */}
			{products.map(({ productId, code, name, detail }) => (
				<input
					key={productId}
					type="hidden"
					name={`label-${casesName(productId)}`}
					value={`${code} ${name}, ${detail}, cases`}
				/>
			))}
			<MendRows rows={pasted ?? props.unmatched} products={products} />
			{table}
			<div className="order-foot">
				<div>
					<SheetKeys />
					<SheetWords values={values} errors={errors} />
					<SheetList error={errors.list} />
				</div>
				<SheetTotals sheet={sheet} />
				<div className="grid content-start gap-2">
					<Button variant="primary" size="big" className="w-full" busy={isSending} busyLabel="Sending">
						{props.sendLabel}
					</Button>
					<MinimumNote sheet={sheet} terms={terms} />
					<SheetChoices {...props} path={path} isEmpty={sheet.price.cases === 0} state={kept.state} />
				</div>
			</div>
		</Form>
	)
}

type ChoicesProps = Pick<OrderSheetProps, "isChange" | "showsLeast" | "products" | "action"> & {
	path: string
	isEmpty: boolean
	state: "keeping" | "kept" | null
}

/** What else can be done with a sheet than to send it. */
function SheetChoices({ isChange, showsLeast, products, action, path, isEmpty, state }: ChoicesProps) {
	const hadSome = products.some((product) => product.lastCases > 0 && product.mayAsk)
	return (
		<div className="grid justify-items-start gap-1">
			{isEmpty && hadSome && !isChange && !action && (
				<ButtonLink variant="plain" size="small" to={`${path}?last`}>
					As last time
				</ButtonLink>
			)}
			{!showsLeast && (
				<Button variant="plain" size="small" name="intent" value="least">
					Least you would take
				</Button>
			)}
			{!isChange && !action && (
				<>
					<Button variant="plain" size="small" name="intent" value="keep">
						Keep for later
					</Button>
					<p className="note" role="status">
						{state === "keeping" && "Keeping what you wrote."}
						{state === "kept" && "What you wrote is kept."}
					</p>
				</>
			)}
		</div>
	)
}
