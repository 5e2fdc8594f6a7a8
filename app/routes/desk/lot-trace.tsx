import { data, Link } from "react-router"
import { mayRunDesk } from "~/domain/people/roles"
import { findBackwardTrace } from "~/services/trace/find-backward-trace.server"
import { findForwardTrace } from "~/services/trace/find-forward-trace.server"
import { SheetHead } from "~/ui/layout/sheet"
import { LotHistories } from "~/ui/trace/lot-history"
import { MarginLinks } from "~/ui/trace/margin-links"
import { LeftWhere, TracedMarketDays, TracedOrders } from "~/ui/trace/trace-tables"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/lot-trace"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Trace of lot ${params.code} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer, roles } = scope
	const query = { producerId: producer.id, code: params.code }
	const forward = await findForwardTrace(query)
	const backward = await findBackwardTrace({ ...query, zone: producer.timeZone })
	if (!forward || !backward) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		forward,
		backward,
		seesOrders: roles.some(mayRunDesk),
	}
})

/** A lot's way forward to all who had it, and back to the hives. */
export default function LotTrace({ loaderData, params }: Route.ComponentProps) {
	const { forward, backward, seesOrders } = loaderData
	const desk = `/desk/${params.producer}`
	const page = `${desk}/lots/${encodeURIComponent(params.code)}`
	const descendants = forward.lots.length - 1
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead
				title={`Trace of lot ${params.code}`}
				lead={
					<>
						Who had it
						{descendants > 0 && `, also as ${descendants === 1 ? "a lot" : `${descendants} lots`} made from it`}, and
						where it came from. <Link to={page}>Back to the lot</Link>
					</>
				}
			/>
			<div className="with-margin">
				<div>
					<TracedOrders orders={forward.orders} ordersHref={seesOrders ? `${desk}/orders` : null} />
					<TracedMarketDays marketDays={forward.marketDays} />
					<LeftWhere lots={forward.lots} lotsHref={`${desk}/lots`} />
				</div>
				<MarginLinks
					label="With this trace"
					links={[
						{ to: `${desk}/trace?${new URLSearchParams({ of: params.code })}`, words: "As a drill, with a balance" },
						...(seesOrders
							? [
									{ to: `${desk}/records`, words: "Records for an inspector" },
									{ to: `${desk}/withdrawals/new?${new URLSearchParams({ lot: params.code })}`, words: "Withdraw it" },
								]
							: []),
					]}
				/>
			</div>
			<h2 className="head-italic px-4 pt-8 desk:px-8">Where it came from</h2>
			<LotHistories {...backward} lotsHref={`${desk}/lots`} />
		</DeskBook>
	)
}
