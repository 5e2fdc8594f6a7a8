import { data, Form, Link } from "react-router"
import { addDays, dayInZone, dayWords, isDay } from "~/domain/calendar"
import { mayRunDesk } from "~/domain/people/roles"
import { casesWords, piecesWords, wholeCases } from "~/domain/quantity"
import { now as askClock } from "~/platform/clock.server"
import { caseStrips } from "~/services/orders/cases-on-day.server"
import { findFreeFigure } from "~/services/promise/find-free-figure.server"
import { caseAndPieceWords } from "~/ui/desk/number-words"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"
import { SheetHead, Totals, TotalsRow } from "~/ui/layout/sheet"
import { stripWords } from "~/ui/orders/strip-words"
import { FigureLines } from "~/ui/stock/figure-lines"
import { FillStrip } from "~/ui/stock/fill-strip"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/why-free"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { promiseParts, supplyParts } from "./why-free-lines"

export const meta: Route.MetaFunction = () => [{ title: "Why so many are free · Waxbill" }]

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const { producer, roles } = scope
		const now = askClock()
		const today = dayInZone(now, producer.timeZone)
		const asked = url.searchParams.get("day")
		const day = asked && isDay(asked) && asked > today ? asked : today
		const figure = await findFreeFigure({ producerId: producer.id, productCode: params.product, day, today })
		if (!figure) throw data(null, { status: 404 })
		const [strip] = caseStrips(figure, [day])
		if (!strip) throw new Error("a strip for each day asked")
		const desk = `/desk/${producer.slug}`
		const { supplies: _, promises: __, ...sums } = figure
		return {
			frame: await findDeskFrame(scope, { part: "lots", day, now }),
			day,
			today,
			sums,
			strip,
			supply: supplyParts(figure, `${desk}/lots`),
			promise: promiseParts(figure, { day, ordersHref: roles.some(mayRunDesk) ? `${desk}/orders` : null }),
			hasLaterPromises: figure.promises.some((promise) => promise.on > day),
		}
	},
)

type Loaded = Route.ComponentProps["loaderData"]

/** What binds the figure, for the margin. */
function tightestWords({ sums, day, hasLaterPromises }: Loaded): string {
	if (sums.raw < 0) return `${piecesWords(-sums.raw)} more are promised or kept than can be there.`
	if (sums.tightestOn > day)
		return `${dayWords(sums.tightestOn)} is the tightest day: more now would break what is promised by then.`
	return hasLaterPromises
		? "This day itself is the tightest: all that is promised later is met by what is over or comes later."
		: "Nothing is promised later, so this day itself decides."
}

export default function WhyFree({ loaderData, params }: Route.ComponentProps) {
	const { sums, day, today, strip, supply, promise } = loaderData
	const cases = wholeCases(sums.free, sums.piecesPerCase)
	const base = `/desk/${params.producer}/promise/${encodeURIComponent(params.product)}`
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead
				title={`Why ${cases === 0 ? "no case" : casesWords(cases)} on ${dayWords(day)}`}
				lead={
					<>
						<span className="fig text-ink-faint">{params.product}</span> {sums.productName}, {sums.detail}, case of{" "}
						{sums.piecesPerCase}. What can still be promised for that day without breaking any promise.
					</>
				}
				note={tightestWords(loaderData)}
			/>
			<div className="desk:mr-[calc(var(--spacing-margin)-1px)]">
				<div className="flex flex-wrap items-end justify-between gap-x-8 gap-y-3 px-4 pb-3 desk:px-8">
					<FillStrip
						runs={[
							{ state: "free", count: strip.free },
							{ state: "held", count: strip.held },
							{ state: "expected", count: strip.expected },
						]}
						caption={stripWords({ strip, toShareCases: 0 }, today)}
					/>
					<Form method="get" className="no-print flex flex-wrap items-end gap-3">
						<TextField name="day" label="Another day" type="date" min={today} defaultValue={day} key={day} />
						<Button>Show</Button>
						<Link className="py-2" to={`${base}?day=${addDays(day, 7)}`}>
							A week later
						</Link>
					</Form>
				</div>
				<FigureLines
					caption="What is there, or will be"
					heads={{ name: "Lot", about: "State", when: "Keeps" }}
					{...supply}
					sum={{ words: "Can be had", pieces: sums.supplied }}
					apartWords="Not counted for this day"
					empty="No lot and no crop of it is known."
				/>
				<FigureLines
					caption="What is promised from it"
					heads={{ name: "Order", about: "Store", when: "For" }}
					{...promise}
					sum={{ words: "Promised", pieces: sums.promised }}
					apartWords="Promises that take nothing from this day"
					empty="Nothing is promised."
				/>
				<div className="px-4 py-6 desk:px-8 desk:max-w-xl">
					<Totals>
						<TotalsRow label="Can be had" value={sums.supplied} note="pieces" />
						<TotalsRow label="less promised" value={sums.promised} />
						<TotalsRow label="less kept for stall and shop" value={sums.reserve} />
						<TotalsRow
							label="Free to promise"
							weight="sum"
							note={sums.raw < 0 ? `${piecesWords(-sums.raw)} short` : caseAndPieceWords(sums.free, sums.piecesPerCase)}
							value={sums.free}
						/>
					</Totals>
				</div>
			</div>
		</DeskBook>
	)
}
