import { data, Link } from "react-router"
import { findCredit } from "~/services/credits/find-credit.server"
import { CreditDocument } from "~/ui/credits/credit-document"
import { MessageLine } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/credit"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Credit ${params.credit} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const credit = await findCredit({ producerId: scope.producer.id, number: params.credit })
	if (!credit) throw data(null, { status: 404 })
	const isJustIssued = url.searchParams.has("issued")
	return { frame: await findDeskFrame(scope, { part: "invoices" }), credit, isJustIssued }
})

export default function Credit({ loaderData: { frame, credit, isJustIssued }, params }: Route.ComponentProps) {
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={frame}>
			{isJustIssued && (
				<MessageLine tone="saved" title={`Credit ${credit.number} is issued.`}>
					{credit.store.name} is told by letter.
				</MessageLine>
			)}
			<div className="invoice-bar no-print">
				<p>
					<Link to={`${base}/credits`}>All credits</Link>
				</p>
				<span className="flex flex-wrap gap-x-5">
					{/* A file, not a page: the router leaves it to the browser. */}
					<Link className="py-1" to={`${base}/credits/${credit.number}.pdf`} reloadDocument>
						Printed page (PDF)
					</Link>
					{credit.invoice && (
						<Link className="py-1" to={`${base}/invoices/${credit.invoice.number}`}>
							Invoice {credit.invoice.number}
						</Link>
					)}
				</span>
			</div>
			<CreditDocument credit={credit} />
		</DeskBook>
	)
}
