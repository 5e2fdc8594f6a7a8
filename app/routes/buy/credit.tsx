import { data, Link } from "react-router"
import { now as askClock } from "~/platform/clock.server"
import { findCredit } from "~/services/credits/find-credit.server"
import { CreditDocument } from "~/ui/credits/credit-document"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/credit"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Credit ${params.credit} · Waxbill` }]

export const loader = guard(admits.store("buyer", "payer"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const credit = await findCredit({ producerId: producer.id, storeId: store.id, number: params.credit })
	if (!credit) throw data(null, { status: 404 })
	return { frame: await findBuyFrame(scope, { part: "invoices", now: askClock() }), credit }
})

export default function Credit({ loaderData: { frame, credit }, params }: Route.ComponentProps) {
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={frame}>
			<div className="invoice-bar no-print">
				<p>
					<Link to={`${base}/credits`}>All your credits</Link>
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
		</BuyBook>
	)
}
