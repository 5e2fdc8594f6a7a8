import { Link } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { findToLookAt, type ToLookAt } from "~/services/receivables/find-to-look-at.server"
import { listReceivables } from "~/services/receivables/list-receivables.server"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ListPages } from "~/ui/desk/list-pages"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { AgeingPicture } from "~/ui/receivables/ageing-picture"
import { ReceivablesTable } from "~/ui/receivables/receivables-table"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/receivables"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Who owes what · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const now = askClock()
	const by = url.searchParams.get("by") === "name" ? "name" : "owed"
	const after = url.searchParams.get("after")
	const today = dayInZone(now, scope.producer.timeZone)
	const producerId = scope.producer.id
	const [list, toLookAt, frame] = await Promise.all([
		listReceivables({ producerId, today, by, after }),
		findToLookAt({ producerId, today }),
		findDeskFrame(scope, { part: "invoices", now }),
	])
	return { frame, by, after, toLookAt, ...list }
})

/** "has promised $929.90 by August 18, 2026", "hands in a certificate that waits for your answer". */
function lookWords({ kind, on, amountCents }: ToLookAt): string {
	if (kind === "certificate-waits") return "has handed in a resale certificate that waits for your answer"
	if (kind === "certificate-ends") return `has a resale certificate that runs out on ${fullDay(on)}`
	return `promised ${formatMoney(amountCents ?? 0)} by ${fullDay(on)}: was it kept?`
}

export default function Receivables({ loaderData, params }: Route.ComponentProps) {
	const { stores, totals, next, by, after, toLookAt } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Who owes what"
				lead="What is open on each store’s invoices, by days past the due date."
				action={
					<span className="flex flex-wrap gap-x-5">
						<Link className="py-1" to={`${base}/reminders`}>
							Reminders
						</Link>
						{/* A file, not a page: the router leaves it to the browser. */}
						<Link className="py-1" to={`${base}/receivables.csv`} reloadDocument>
							For a spreadsheet (CSV)
						</Link>
					</span>
				}
			/>
			{toLookAt.length > 0 && !after && (
				<ul className="px-4 pb-4 desk:px-8" aria-label="To look at">
					{toLookAt.map((one) => (
						<li key={`${one.kind} ${one.storeSlug} ${one.on} ${one.amountCents}`}>
							<Link
								className="inline-block py-1"
								to={`${base}/stores/${one.storeSlug}${one.kind === "promise-passed" ? "" : "/certificate"}`}
							>
								{one.storeName}
							</Link>{" "}
							{lookWords(one)}
						</li>
					))}
				</ul>
			)}
			<FilterLinks
				label="Order of the stores"
				name="by"
				chosen={by === "owed" ? "" : by}
				options={[
					{ value: "", label: "Most owed first" },
					{ value: "name", label: "By name" },
				]}
			/>
			{stores.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/invoices`}>All invoices</Link>}>
					{after ? "Nobody further." : "Nobody owes anything."}
				</EmptyLine>
			) : (
				<>
					<AgeingPicture stores={stores} storesHref={`${base}/stores`} />
					<ReceivablesTable stores={stores} totals={totals} storesHref={`${base}/stores`} />
				</>
			)}
			<ListPages
				params={{ ...(by === "name" ? { by } : {}), ...(after ? { after } : {}) }}
				next={next}
				laterWords="Further stores"
			/>
		</DeskBook>
	)
}
