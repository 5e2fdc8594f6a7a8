import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, dayWords, instantAt, isDay, timeWords, weekday, weekdayName } from "~/domain/calendar"
import { mayRunDesk } from "~/domain/people/roles"
import { now as askClock } from "~/platform/clock.server"
import { confirmWhole, undoWhole } from "~/services/desk/confirm-whole.server"
import { findPackingDays, findToDo } from "~/services/desk/find-to-do.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { undoConfirmation } from "~/services/orders/undo-confirmation.server"
import { countHead } from "~/ui/desk/number-words"
import { Owed, ToDoGroups } from "~/ui/desk/to-do-rows"
import { useConfirmKey } from "~/ui/desk/use-confirm-key"
import { Button } from "~/ui/forms/button"
import { LedgerGroup, LedgerRow } from "~/ui/layout/ledger"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { StockKey } from "~/ui/stock/stock-key"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/to-do"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { orderProblem } from "./order-words"
import { owedRows, packingGroups, toDoGroups } from "./to-do.server"

export const meta: Route.MetaFunction = () => [{ title: "To do · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, roles } = scope
	const now = askClock()
	const zone = producer.timeZone
	const moment = { now, zone, today: dayInZone(now, zone), base: `/desk/${producer.slug}` }
	const seesAll = roles.some(mayRunDesk)
	const toDo = seesAll ? await findToDo({ producerId: producer.id, now, zone }) : null
	const groups = toDo
		? toDoGroups(toDo, moment)
		: packingGroups(await findPackingDays({ producerId: producer.id }), moment)
	const owed = toDo ? owedRows(toDo.overdue, moment) : []
	const toSettle = groups.reduce((sum, group) => sum + group.rows.length, owed.length)
	const from = url.searchParams.get("from")
	const countOf = (name: string) => {
		const count = Number(url.searchParams.get(name))
		return Number.isSafeInteger(count) && count > 0 ? count : null
	}
	const base = moment.base
	return {
		frame: await findDeskFrame(scope, { part: "", now, toSettle, ...(from && isDay(from) ? { from } : {}) }),
		title: `${weekdayName(weekday(moment.today))} ${partOfDay(now, zone)}`,
		groups,
		owed,
		toSettle,
		lookHrefs: seesAll ? { season: `${base}/season`, figures: `${base}/figures` } : null,
		settled: toDo && {
			...toDo.settled,
			undoableInAll: toDo.settled.undoable.length,
			undoable: toDo.settled.undoable
				.slice(0, MOST_UNDOABLE)
				.map(({ at, ...one }) => ({ ...one, at: timeWords(at, zone) })),
		},
		done: countOf("confirmed"),
		more: countOf("more"),
		isUndone: url.searchParams.has("undone"),
	}
})

/** So many confirmations stand on the page with an Undo of their own. */
const MOST_UNDOABLE = 20

const number = z.coerce.number().int().min(1).max(999_999_999)

export const action = guard(admits.desk("owner", "desk"), async ({ request, url }: Route.ActionArgs, scope) => {
	const { producer, person } = scope
	const form = await request.formData()
	const intent = form.get("intent")
	if (intent === "confirm-whole") {
		const day = String(form.get("day") ?? "")
		if (!isDay(day)) throw data(null, { status: 400 })
		const { confirmed, left, more } = await confirmWhole({ producer, personId: person.id, day })
		if (left > 0 && confirmed === 0) {
			const problem = `Nothing was confirmed: none of the orders for ${dayWords(day)} can be met in full any more.`
			return data({ problem }, { status: 422 })
		}
		throw redirect(`${url.pathname}?confirmed=${confirmed}${more > 0 ? `&more=${more}` : ""}`)
	}
	if (intent === "undo-whole") {
		const undone = await undoWhole({ producer, personId: person.id })
		if (undone > 0) throw redirect(`${url.pathname}?undone=${undone}`)
		return data({ problem: "Every letter has gone. A change is a new decision now." }, { status: 422 })
	}
	const parsed = number.safeParse(form.get("number"))
	if (!parsed.success) throw data(null, { status: 400 })
	if (intent === "confirm") {
		const answer = await confirmOrder({ producer, number: parsed.data, personId: person.id, given: [] })
		if (answer.ok) throw redirect(`${url.pathname}?confirmed=1`)
		if (answer.reason === "no-such-order") throw data(null, { status: 404 })
		return data({ problem: orderProblem(parsed.data, answer) }, { status: 422 })
	}
	if (intent !== "undo") throw data(null, { status: 400 })
	const answer = await undoConfirmation({ producer, number: parsed.data, personId: person.id })
	if (answer.ok) throw redirect(`${url.pathname}?undone`)
	if (answer.reason === "no-such-order") throw data(null, { status: 404 })
	return data({ problem: orderProblem(parsed.data, answer) }, { status: 422 })
})

function partOfDay(now: Date, zone: string): string {
	const today = dayInZone(now, zone)
	if (now < instantAt(today, "12:00", zone)) return "morning"
	return now < instantAt(today, "17:00", zone) ? "afternoon" : "evening"
}

export default function ToDo({ loaderData, actionData }: Route.ComponentProps) {
	const { groups, owed, toSettle, settled, title, done, more, isUndone, lookHrefs } = loaderData
	useConfirmKey()
	const things = `${countHead(toSettle)} ${toSettle === 1 ? "thing" : "things"} to settle.`
	return (
		<DeskBook frame={loaderData.frame} ruled>
			{actionData && (
				<MessageLine tone="problem" title="That could not be done.">
					{actionData.problem}
				</MessageLine>
			)}
			{!actionData && done !== null && (
				<MessageLine
					tone="saved"
					title={done === 1 ? "One order is confirmed." : `${countHead(done)} orders are confirmed.`}
				>
					The letters go in two minutes; until then you can take it back below.
					{more !== null && ` ${more.toLocaleString("en-US")} more can be met: confirm again for the next.`}
				</MessageLine>
			)}
			{!actionData && isUndone && (
				<MessageLine tone="saved" title="It is taken back.">
					No letter went out. What was confirmed waits again.
				</MessageLine>
			)}
			<SheetHead
				title={title}
				lead={toSettle === 0 ? "Nothing to settle." : things}
				note={
					lookHrefs && (
						<>
							Which weeks will be short? <Link to={lookHrefs.season}>The season ahead</Link>.{" "}
							<Link to={lookHrefs.figures}>What was sold</Link>
						</>
					)
				}
			/>
			{toSettle === 0 ? (
				<EmptyLine>Nothing to settle. New orders appear here as stores send them.</EmptyLine>
			) : (
				<>
					<ToDoGroups groups={groups} />
					<Owed invoices={owed} />
				</>
			)}
			{settled && <Settled settled={settled} />}
			<div className="px-4 py-4 desk:pl-[132px]">
				<StockKey />
			</div>
		</DeskBook>
	)
}

type SettledProps = NonNullable<Route.ComponentProps["loaderData"]["settled"]>

function Settled({ settled }: { settled: SettledProps }) {
	const { undoable, undoableInAll, confirmed, packed, sent, paid } = settled
	const done = [
		confirmed > 0 && `${countHead(confirmed)} ${confirmed === 1 ? "order" : "orders"} confirmed`,
		packed > 0 && `${countHead(packed)} ${packed === 1 ? "order" : "orders"} packed`,
		sent > 0 && `${countHead(sent)} ${sent === 1 ? "invoice" : "invoices"} sent`,
		paid > 0 && `${countHead(paid)} ${paid === 1 ? "payment" : "payments"} in`,
	].filter((words) => words !== false)
	if (undoable.length === 0 && done.length === 0) return null
	return (
		<LedgerGroup when="Settled today">
			{undoable.map(({ number, storeName, at }) => (
				<LedgerRow
					key={number}
					state="settled"
					name={`Order ${number} of ${storeName}`}
					line={`Confirmed ${at}; its letter has not gone yet.`}
					action={
						<Form method="post" preventScrollReset>
							<input type="hidden" name="number" value={number} />
							<Button
								variant="plain"
								name="intent"
								value="undo"
								aria-label={`Undo the confirmation of order ${number} of ${storeName}`}
							>
								Undo
							</Button>
						</Form>
					}
				/>
			))}
			{undoableInAll > 1 && (
				<Form method="post" className="py-2" preventScrollReset>
					<Button name="intent" value="undo-whole">
						Take all {undoableInAll} back
					</Button>
				</Form>
			)}
			{done.length > 0 && (
				<p className="flex flex-wrap gap-x-6 py-3 text-ink-soft">
					{done.map((words) => (
						<s key={words}>{words}</s>
					))}
				</p>
			)}
		</LedgerGroup>
	)
}
