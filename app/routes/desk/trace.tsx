import { data, Form, Link } from "react-router"
import { dayInZone, dayWords, timeWords } from "~/domain/calendar"
import { mayRunDesk } from "~/domain/people/roles"
import { runDrill } from "~/services/trace/run-drill.server"
import { counted } from "~/ui/desk/number-words"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { SheetHead } from "~/ui/layout/sheet"
import { DrillBalance } from "~/ui/trace/drill-balance"
import { TracedMarketDays, TracedOrders } from "~/ui/trace/trace-tables"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/trace"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "A trace as a drill · Waxbill" }]

const NOT_FOUND = "No lot has this code, and no order with lots has this number."

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, roles, person } = scope
	const asked = (url.searchParams.get("of") ?? "").trim().slice(0, 80)
	const drill = asked === "" ? null : await runDrill({ producerId: producer.id, asked })
	const frame = await findDeskFrame(scope, { part: "lots" })
	const ran =
		drill && `${dayWords(dayInZone(drill.ranAt, producer.timeZone))}, ${timeWords(drill.ranAt, producer.timeZone)}`
	const answer = { frame, asked, ran, drill, by: person.name, seesOrders: roles.some(mayRunDesk) }
	return data(answer, { status: asked !== "" && !drill ? 404 : 200 })
})

const found = (count: number, one: string) => (count === 0 ? `no ${one}` : counted(count, one))

/** A drill: one lot or order is traced, and the page says how long it took and whether every piece is accounted for. */
export default function Trace({ loaderData, params }: Route.ComponentProps) {
	const { asked, drill, ran, by, seesOrders } = loaderData
	const isMissing = asked !== "" && !drill
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead
				title={drill ? `Drill: ${drill.orderNumber === null ? "lot" : "order"} ${asked}` : "A trace as a drill"}
				lead={
					drill
						? `Run by ${by} on ${ran}.`
						: "Take any lot or order and see whether every piece of it can be found. Print the page and keep it."
				}
				note={
					seesOrders && (
						<span className="no-print">
							<Link to={`/desk/${params.producer}/withdrawals`}>Withdrawals</Link>,{" "}
							<Link to={`/desk/${params.producer}/records`}>records for an inspector</Link>
						</span>
					)
				}
			/>
			<div className="no-print">
				<ErrorSummary title="Nothing was traced" errors={isMissing ? [{ field: "of", message: NOT_FOUND }] : []} />
				<Form method="get" className="sheet-form in-line">
					<TextField
						name="of"
						label="Lot code or order number"
						autoComplete="off"
						defaultValue={asked}
						error={isMissing ? NOT_FOUND : undefined}
					/>
					<div>
						<Button variant="primary">Trace it</Button>
					</div>
				</Form>
			</div>
			{drill && (
				<>
					<div className="sheet-part">
						<p>
							The trace took <b>{drill.tookMilliseconds} ms</b> and found {counted(drill.lots.length, "lot")},{" "}
							{found(new Set(drill.trace.orders.map(({ storeId }) => storeId)).size, "store")} and{" "}
							{found(new Set(drill.trace.marketDays.map(({ id }) => id)).size, "market day")}.
						</p>
						{drill.faults.length === 0 ? (
							<p>
								<b>The pieces balance.</b> Every harvested piece is accounted for, and every sold one has an order or a
								market day.
							</p>
						) : (
							drill.faults.map((fault) => (
								<p key={fault} className="short">
									{fault}
								</p>
							))
						)}
					</div>
					<DrillBalance lots={drill.lots} />
					<TracedOrders
						orders={drill.trace.orders}
						ordersHref={seesOrders ? `/desk/${params.producer}/orders` : null}
					/>
					<TracedMarketDays marketDays={drill.trace.marketDays} />
				</>
			)}
		</DeskBook>
	)
}
