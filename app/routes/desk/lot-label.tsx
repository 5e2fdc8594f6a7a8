import { data, Link } from "react-router"
import { fullDay } from "~/domain/calendar"
import { findPublicLot } from "~/services/trace/find-public-lot.server"
import { SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/lot-label"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Label of lot ${params.code} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const lot = await findPublicLot({ producerId: producer.id, code: params.code })
	if (!lot) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		yardName: producer.name,
		lot: {
			code: lot.code,
			state: lot.state,
			productName: lot.productName,
			detail: lot.detail,
			bestBeforeOn: lot.bestBeforeOn,
		},
	}
})

/** A small label that leads to the lot's public page. The browser prints it. */
export default function LotLabel({ loaderData, params }: Route.ComponentProps) {
	const { lot, yardName } = loaderData
	const page = `/desk/${params.producer}/lots/${encodeURIComponent(lot.code)}`
	return (
		<DeskBook frame={loaderData.frame}>
			<div className="no-print">
				<SheetHead
					title={`Label of lot ${lot.code}`}
					lead={
						<>
							Three inches wide; print it from your browser at full size. It carries the lot and its page, and is not
							the label that the law asks for. <Link to={page}>Back to the lot</Link>
						</>
					}
				/>
				{lot.state === "withdrawn" && <p className="short px-4 desk:px-8">This lot is withdrawn.</p>}
			</div>
			<div className="lot-label">
				<img src={`${page}/qr.svg`} alt={`The address of the page of lot ${lot.code}`} width={125} height={125} />
				<div>
					<p>
						<b>{yardName}</b>
					</p>
					<p>
						{lot.productName}, {lot.detail}
					</p>
					<p>
						Lot <b>{lot.code}</b>
					</p>
					<p>Best before {fullDay(lot.bestBeforeOn)}</p>
					<p className="note">Not for infants under one year.</p>
				</div>
			</div>
		</DeskBook>
	)
}
