import { data, Link } from "react-router"
import { findPackingSlip } from "~/services/orders/find-packing-slip.server"
import { PackingSlipDocument } from "~/ui/orders/packing-slip-document"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/packing-slip"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Packing slip ${params.number} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ params }: Route.LoaderArgs, scope) => {
	const number = /^[1-9]\d{0,8}$/.test(params.number) ? Number(params.number) : null
	const slip = number === null ? null : await findPackingSlip({ producerId: scope.producer.id, number })
	if (!slip) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "packing", day: slip.deliveryOn }),
		slip,
	}
})

export default function PackingSlipPage({ loaderData, params }: Route.ComponentProps) {
	const { slip } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			<div className="invoice-bar no-print">
				<p>It goes into the case; prices are on the invoice alone.</p>
				<span className="flex flex-wrap gap-x-5">
					{/* A file, not a page: the router leaves it to the browser. */}
					<Link className="py-1" to={`${base}/orders/${slip.orderNumber}/packing-slip.pdf`} reloadDocument>
						Printed page (PDF)
					</Link>
					<Link className="py-1" to={`${base}/packing?day=${slip.deliveryOn}`}>
						Packing
					</Link>
				</span>
			</div>
			<PackingSlipDocument slip={slip} />
		</DeskBook>
	)
}
