import type { ReactNode } from "react"
import { type Day, shortMonthDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { casesWords } from "~/domain/quantity"
import { FillStrip } from "~/ui/stock/fill-strip"
import { DateField, InsteadField, StandingField } from "./standing-field"

export type StandingProduct = { productId: string; code: string; name: string; detail: string; piecesPerCase: number }

/** How what is asked on a date can be met, in cases. */
export type ShownForecast = { free: number; held: number; expected: number; short: number; cases: number }

/** A column: one of the next dates. `ruleOn` names it; a forecast stands for each product that is asked for. */
export type DateColumn = {
	ruleOn: Day
	deliveryOn: Day
	isMoved: boolean
	isOpen: boolean
	isSkipped: boolean
	/** "open until Friday noon", "closed". */
	words: string
	orderNumber: number | null
	/** Cases of that date by product id; none where the standing order leaves the product out. */
	asked: Readonly<Record<string, number>>
	/** Usual cases by product id, to say what a changed date is not. */
	usual: Readonly<Record<string, number>>
	/** By product id. */
	forecast: Readonly<Record<string, ShownForecast>>
	cases: number
	totalCents: number
	/** What is likely to be short, in a sentence; empty when nothing is. */
	says: string
}

type StandingTableProps = {
	products: readonly StandingProduct[]
	dates: readonly DateColumn[]
	values: Readonly<Record<string, string>>
	errors: Readonly<Record<string, string>>
	producerName: string
	/** The button that skips a date or puts it back; none while the dates are only a preview. */
	dateAction?: (date: DateColumn) => ReactNode
	/** The date that is being changed, by the rule, and the form its fields belong to. */
	openDate: { ruleOn: Day; formId: string } | null
}

/** Lines down, next dates across: what is asked, how likely it comes, and why not. */
export function StandingTable({
	products,
	dates,
	values,
	errors,
	producerName,
	dateAction,
	openDate,
}: StandingTableProps) {
	return (
		<div className="standing-scroll">
			<table className="standing-table">
				<thead>
					<tr>
						<th scope="col" className="no">
							No.
						</th>
						<th scope="col" className="product">
							Product
						</th>
						<th scope="col" className="num">
							Usual,
							<br />
							cases
						</th>
						<th scope="col" className="num">
							Least you
							<br />
							would take
						</th>
						<th scope="col" className="instead">
							If short,
							<br />
							take instead
						</th>
						{dates.map((date) => (
							<th key={date.ruleOn} scope="col" className={columnClass(date)}>
								<b className="standing-date">{shortMonthDay(date.deliveryOn)}</b>
								{date.words}
								{dateAction && <div className="mt-1">{dateAction(date)}</div>}
							</th>
						))}
					</tr>
				</thead>
				<tbody>
					{products.map((product) => (
						<tr key={product.productId}>
							<td className="no">{product.code}</td>
							<td className="product">
								<span className="name block text-body!">{product.name}</span>
								<span className="note">
									{[product.detail, `case of ${product.piecesPerCase}`].filter(Boolean).join(", ")}
								</span>
							</td>
							<td className="num">
								<StandingField kind="cases" product={product} values={values} errors={errors} />
							</td>
							<td className="num">
								<StandingField kind="least" product={product} values={values} errors={errors} />
							</td>
							<td className="instead">
								<InsteadField product={product} values={values} errors={errors} />
							</td>
							{dates.map((date) => (
								<td key={date.ruleOn} className={columnClass(date)}>
									{openDate?.ruleOn === date.ruleOn && date.usual[product.productId] !== undefined ? (
										<DateField
											product={product}
											formId={openDate.formId}
											value={values[`on-${product.productId}`] ?? String(date.asked[product.productId] ?? 0)}
											error={errors[`on-${product.productId}`]}
										/>
									) : (
										<Forecast date={date} productId={product.productId} />
									)}
								</td>
							))}
						</tr>
					))}
				</tbody>
				{dates.length > 0 && (
					<tfoot>
						<tr>
							<th scope="row" colSpan={5} className="pl-4! desk:pl-[102px]!">
								<b>If all are met</b> <span className="note">at your prices, before any sharing out</span>
							</th>
							{dates.map((date) => (
								<td key={date.ruleOn} className={columnClass(date)}>
									{date.isSkipped || date.cases === 0 ? (
										<span className="note">none</span>
									) : (
										<>
											<span className="fig block">{formatMoney(date.totalCents)}</span>
											<span className="note">{casesWords(date.cases)}</span>
										</>
									)}
								</td>
							))}
						</tr>
						<tr>
							<td colSpan={5} className="aside pl-4! desk:pl-[102px]!">
								What {producerName} expects as things stand. It changes as the hives come off; you can skip or change a
								date until its last orders.
							</td>
							{dates.map((date) => (
								<td key={date.ruleOn} className={`aside ${columnClass(date)}`}>
									{date.isSkipped ? "" : date.says}
								</td>
							))}
						</tr>
					</tfoot>
				)}
			</table>
		</div>
	)
}

function columnClass({ isSkipped, isOpen }: DateColumn): string {
	return ["date", isSkipped && "skipped", !isOpen && "closed"].filter(Boolean).join(" ")
}

/** What is asked on a date, "2 not 3" where it is that date's own, and how it can be met. */
function Forecast({ date, productId }: { date: DateColumn; productId: string }) {
	const usual = date.usual[productId]
	if (date.isSkipped || !usual) return null
	const asked = date.asked[productId] ?? 0
	const forecast = date.forecast[productId]
	return (
		<>
			<span className="block whitespace-nowrap">
				<span className={asked === usual ? "fig text-figure" : "fig text-figure font-semibold text-clover"}>
					{asked}
				</span>
				{asked !== usual && <span className="note"> not {usual}</span>}
			</span>
			{forecast && asked > 0 && (
				<FillStrip
					countsThrough
					runs={[
						{ state: "free", count: forecast.free },
						{ state: "held", count: forecast.held },
						{ state: "expected", count: forecast.expected },
						{ state: "short", count: forecast.short },
					]}
				/>
			)}
		</>
	)
}
