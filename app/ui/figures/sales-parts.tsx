import type { ReactNode } from "react"
import { Link } from "react-router"
import { type Day, shortMonthDay } from "~/domain/calendar"
import { type SoldSpan, type Span, spanWords } from "~/domain/figures/spans"
import { formatMoney, plainMoney } from "~/domain/money"
import { FigurePart } from "./figure-part"
import { FigureTable } from "./figure-table"
import { PartBars } from "./part-bars"
import { SoldPicture } from "./sold-picture"

/** Sales by week, month or year. */
export function SpansPart({ spans, span, csvHref }: { spans: readonly SoldSpan[]; span: Span; csvHref: string }) {
	const table = (
		<FigureTable
			label={`Sales by ${span}`}
			columns={[
				{ head: span === "week" ? "Week of" : span === "month" ? "Month" : "Year" },
				{ head: "Stores", isFigure: true },
				{ head: "Stall", isFigure: true },
				{ head: "Both", isFigure: true },
			]}
			rows={spans.map(({ startOn, storeCents, stallCents }) => ({
				key: startOn,
				cells: [spanWords(startOn, span), ...[storeCents, stallCents, storeCents + stallCents].map(plainMoney)],
			}))}
		/>
	)
	return (
		<FigurePart id="spans" title={`By ${span}`} csvHref={csvHref} tableName={`Each ${span}`} table={table}>
			<SoldPicture spans={spans} span={span} />
		</FigurePart>
	)
}

type SoldProduct = {
	code: string
	name: string
	detail: string
	storeCents: number
	storeCases: number
	stallCents: number
	stallPieces: number
}

/** Sales by product, stores and stall apart. */
export function ProductsPart({ products, csvHref }: { products: readonly SoldProduct[]; csvHref: string }) {
	const table = (
		<FigureTable
			label="Sales by product"
			columns={[
				{ head: "Product" },
				{ head: "Stores", isFigure: true },
				{ head: "Cases", isFigure: true },
				{ head: "Stall", isFigure: true },
				{ head: "Pieces", isFigure: true },
				{ head: "Both", isFigure: true },
			]}
			rows={products.map((one) => ({
				key: one.code,
				cells: [
					`${one.code} ${one.name}, ${one.detail}`,
					plainMoney(one.storeCents),
					one.storeCases,
					plainMoney(one.stallCents),
					one.stallPieces,
					plainMoney(one.storeCents + one.stallCents),
				],
			}))}
		/>
	)
	return (
		<FigurePart id="products" title="By product" csvHref={csvHref} tableName="Each product" table={table}>
			<PartBars
				label="Sales by product"
				bars={products.map(({ code, name, storeCents, stallCents }) => ({
					key: code,
					name: (
						<>
							<span className="fig text-ink-faint">{code}</span> {name}
						</>
					),
					parts: [
						{ fill: "money-in", amount: storeCents },
						{ fill: "money-out", amount: stallCents },
					],
					words: <span className="money">{formatMoney(storeCents + stallCents)}</span>,
					label: `${code} ${name}: stores ${formatMoney(storeCents)}, stall ${formatMoney(stallCents)}`,
				}))}
			/>
		</FigurePart>
	)
}

type Channel = { of: string | null; cents: number; count: number }

/** Sales by way of selling: stores together, and each market. */
export function ChannelsPart({ channels, csvHref }: { channels: readonly Channel[]; csvHref: string }) {
	const name = ({ of }: Channel) => of ?? "Stores"
	const how = ({ of, count }: Channel) => `${count} ${of === null ? "invoice" : "sale"}${count === 1 ? "" : "s"}`
	const table = (
		<FigureTable
			label="Sales by way of selling"
			columns={[{ head: "Where" }, { head: "Amount", isFigure: true }, { head: "Papers", isFigure: true }]}
			rows={channels.map((one) => ({ key: name(one), cells: [name(one), plainMoney(one.cents), how(one)] }))}
		/>
	)
	return (
		<FigurePart id="channels" title="Stores and stall" csvHref={csvHref} tableName="Each place" table={table}>
			<PartBars
				label="Sales by way of selling"
				bars={channels.map((one) => ({
					key: name(one),
					name: name(one),
					parts: [{ fill: one.of === null ? "money-in" : "money-out", amount: one.cents }],
					words: (
						<>
							<span className="money">{formatMoney(one.cents)}</span> <span className="note">{how(one)}</span>
						</>
					),
					label: `${name(one)}: ${formatMoney(one.cents)}`,
				}))}
			/>
		</FigurePart>
	)
}

type SoldStore = { slug: string; name: string; cents: number; invoices: number; lastOn: Day }

/** The stores that bought most, the first of `count`. */
export function StoresPart({
	stores,
	count,
	storesHref,
	csvHref,
}: {
	stores: readonly SoldStore[]
	count: number
	storesHref: string
	csvHref: string
}) {
	const table = (
		<FigureTable
			label="Sales by store"
			columns={[
				{ head: "Store" },
				{ head: "Amount", isFigure: true },
				{ head: "Invoices", isFigure: true },
				{ head: "Last invoice" },
			]}
			rows={stores.map(({ slug, name, cents, invoices, lastOn }) => ({
				key: slug,
				cells: [name, plainMoney(cents), invoices, shortMonthDay(lastOn)],
			}))}
		/>
	)
	const lead: ReactNode =
		count > stores.length ? `The first ${stores.length} of ${count} stores; the file has all.` : undefined
	return (
		<FigurePart id="stores" title="By store" lead={lead} csvHref={csvHref} tableName="Each store" table={table}>
			<PartBars
				label="Sales by store"
				bars={stores.map(({ slug, name, cents }) => ({
					key: slug,
					name: <Link to={`${storesHref}/${slug}`}>{name}</Link>,
					parts: [{ fill: "money-in", amount: cents }],
					words: <span className="money">{formatMoney(cents)}</span>,
					label: `${name}: ${formatMoney(cents)}`,
				}))}
			/>
		</FigurePart>
	)
}
