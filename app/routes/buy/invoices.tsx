import { Link } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { mayPay } from "~/domain/people/roles"
import { now as askClock } from "~/platform/clock.server"
import { listInvoices } from "~/services/invoicing/list-invoices.server"
import { findVisit } from "~/services/payments/find-visit.server"
import { ListPages } from "~/ui/desk/list-pages"
import { InvoiceTable } from "~/ui/invoicing/invoice-table"
import { PaymentOnItsWay } from "~/ui/invoicing/payment-on-its-way"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invoices"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Invoices · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, store, storeRoles } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const after = url.searchParams.get("after")
	// The visit first: where it says paid, the list says so too.
	const visitId = url.searchParams.get("paid")
	const visit = await findVisit({ producerId: producer.id, storeId: store.id, visitId })
	const list = await listInvoices({ producerId: producer.id, storeId: store.id, filter: "all", today, after })
	return {
		frame: await findBuyFrame(scope, { part: "invoices", now }),
		today,
		after,
		canPay: storeRoles.some(mayPay) && list.invoices.some(({ openCents }) => openCents > 0),
		visit,
		...list,
	}
})

export default function Invoices({ loaderData, params }: Route.ComponentProps) {
	const { invoices, next, today, after, canPay, visit } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={loaderData.frame}>
			{visit && <AfterPaying visit={visit} />}
			<SheetHead
				title="Invoices"
				lead="What is still to pay comes first, then what is paid, the latest first."
				action={
					<span className="flex flex-wrap gap-x-5">
						{canPay && (
							<Link className="py-1" to={`${base}/pay`}>
								Pay several at once
							</Link>
						)}
						<Link className="py-1" to={`${base}/statement`}>
							Statement
						</Link>
						<Link className="py-1" to={`${base}/credits`}>
							Credits
						</Link>
					</span>
				}
			/>
			{invoices.length === 0 ? (
				<EmptyLine>
					{after ? "Nothing earlier." : "No invoice yet. The first comes with your first delivery."}
				</EmptyLine>
			) : (
				<InvoiceTable invoices={invoices} today={today} base={base} />
			)}
			<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier invoices" />
		</BuyBook>
	)
}

/** What came of the visit to the payment page that the person has come back from. */
function AfterPaying({ visit }: { visit: NonNullable<Route.ComponentProps["loaderData"]["visit"]> }) {
	const { method, state, amountCents } = visit
	if (state === "paid") {
		return (
			<MessageLine tone="saved" title={`${formatMoney(amountCents)} paid, thank you.`}>
				A receipt goes to whoever paid.
			</MessageLine>
		)
	}
	if (state === "on-its-way") {
		return (
			<MessageLine tone="saved" title={`Your bank debit of ${formatMoney(amountCents)} is on its way.`}>
				It takes some days to clear; a receipt follows then. You need do nothing more.
			</MessageLine>
		)
	}
	return state === "open" || (state === "declined" && method === "card") ? <PaymentOnItsWay /> : null
}
