import { data, Link } from "react-router"
import { type Day, dayInZone, fullDay, shortMonthDay, timeWords } from "~/domain/calendar"
import { findWithdrawal, type NoticeFilter } from "~/services/withdrawals/find-withdrawal.server"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ListPages } from "~/ui/desk/list-pages"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { FactList } from "~/ui/trace/lot-facts"
import { MarginLinks } from "~/ui/trace/margin-links"
import { NoticeTable } from "~/ui/trace/notice-table"
import { WithdrawalReach } from "~/ui/trace/withdrawal-reach"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/withdrawal"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Withdrawal ${params.number} · Waxbill` }]

const FILTERS: readonly { value: NoticeFilter; label: string }[] = [
	{ value: "all", label: "All" },
	{ value: "no-letter", label: "to be called" },
	{ value: "not-opened", label: "not opened" },
	{ value: "not-answered", label: "not answered" },
	{ value: "answered", label: "answered" },
]

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	if (!/^[1-9]\d{0,8}$/.test(params.number)) throw data(null, { status: 404 })
	const filter = FILTERS.find(({ value }) => value === url.searchParams.get("notices"))?.value ?? "all"
	const after = url.searchParams.get("after")
	const query = { producerId: producer.id, number: Number(params.number), filter, after }
	const withdrawal = await findWithdrawal(query)
	if (!withdrawal) throw data(null, { status: 404 })
	const zone = producer.timeZone
	const moment = (at: Date | null) => at && `${shortMonthDay(dayInZone(at, zone))}, ${timeWords(at, zone)}`
	const { startedAt, notices, ...facts } = withdrawal
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		withdrawal: facts,
		on: fullDay(dayInZone(startedAt, zone)) as Day,
		filter,
		after,
		isBegun: url.searchParams.has("begun"),
		notices: notices.map(({ openedAt, answeredAt, ...notice }) => ({
			...notice,
			opened: moment(openedAt),
			answered: moment(answeredAt),
		})),
	}
})

/** How far a withdrawal has come: what is left, who was told, who has opened the notice and answered. */
export default function Withdrawal({ loaderData, params }: Route.ComponentProps) {
	const { withdrawal, on, filter, after, notices, isBegun } = loaderData
	const { totals, lots } = withdrawal
	const desk = `/desk/${params.producer}`
	const by = withdrawal.startedBy ? ` by ${withdrawal.startedBy}` : ""
	return (
		<DeskBook frame={loaderData.frame} ruled>
			{isBegun && (
				<MessageLine tone="saved" title={`Withdrawal ${withdrawal.number} has begun.`}>
					{totals.stores === 0 ? "No store was sent any of it." : "The letters are on their way."}
				</MessageLine>
			)}
			<SheetHead
				title={`Withdrawal ${withdrawal.number}`}
				lead={`${lots.length === 1 ? "Lot" : "Lots"} ${lots.map(({ code }) => code).join(", ")}, withdrawn on ${on}${by}.`}
				note={
					totals.answered < totals.stores && totals.stores > 0
						? `${totals.unansweredPieces} pieces are with stores that have not answered.`
						: undefined
				}
			/>
			<div className="with-margin">
				<FactList
					facts={[
						{ name: "Why", fact: withdrawal.reason },
						{ name: "What to do", fact: withdrawal.instructions },
						...lots.map((lot) => ({
							name: `Lot ${lot.code}`,
							fact: (
								<>
									<Link className="inline-block py-1" to={`${desk}/lots/${encodeURIComponent(lot.code)}`}>
										{lot.productName}
									</Link>
									: {lot.piecesOut} sold when it began, {lot.inHand} in hand now
								</>
							),
						})),
						{
							name: "Stores",
							fact: `${totals.stores} had ${totals.pieces} pieces; ${totals.mailed} mailed, ${totals.opened} opened, ${totals.answered} answered and still hold ${totals.heldPieces}`,
						},
						{ name: "To be called", fact: totals.toCall === 0 ? "" : `${totals.toCall}: no address is known` },
					]}
				/>
				<MarginLinks
					label="With this withdrawal"
					links={[
						{ to: `${desk}/withdrawals/${withdrawal.number}/poster`, words: "Notice to print and put up" },
						{ to: `${desk}/records`, words: "Records for an inspector" },
						{ to: `${desk}/withdrawals`, words: "All withdrawals" },
					]}
				/>
			</div>
			<WithdrawalReach {...withdrawal} ordersHref={`${desk}/orders`} />
			<h2 className="head-italic px-4 pt-6 desk:px-8">Who was told</h2>
			<FilterLinks label="Notices by what became of them" name="notices" chosen={filter} options={FILTERS} />
			{notices.length === 0 ? (
				<EmptyLine>{filter === "all" ? "No store was sent any of it." : "No store among these."}</EmptyLine>
			) : (
				<NoticeTable notices={notices} />
			)}
			<ListPages
				params={{ ...(filter === "all" ? {} : { notices: filter }), ...(after ? { after } : {}) }}
				next={withdrawal.next}
				laterWords="More stores"
			/>
		</DeskBook>
	)
}
