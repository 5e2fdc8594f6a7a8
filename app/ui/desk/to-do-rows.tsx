import type { ReactNode } from "react"
import { Form, Link, useNavigation } from "react-router"
import { Button, ButtonLink } from "~/ui/forms/button"
import { LedgerGroup, LedgerRow } from "~/ui/layout/ledger"
import { FillStrip } from "~/ui/stock/fill-strip"
import type { StripRun } from "~/ui/stock/strip-geometry"

/** One order that waits, below the row of its day. */
type WaitingOrderRow = {
	number: number
	storeName: string
	to: string
	line: string
	money: string
	/** All of it can be given, so that it can be confirmed from here. */
	isWhole: boolean
}

/** One thing to settle. */
export type ToDoRow = {
	key: string
	name: string
	line?: string
	strip?: { runs: StripRun[]; caption: string; short?: string }
	link?: { to: string; label: string; about: string; icon?: "printer" }
	/** One button that confirms all orders of a day that can be met in full. */
	confirmAll?: { day: string; label: string }
	orders?: WaitingOrderRow[]
	/** Where the orders are that are not shown. */
	rest?: { to: string; label: string }
}

export type ToDoGroup = { when: string; note?: string; rows: ToDoRow[] }

/** What there is to settle, by when; every button works without a script. */
export function ToDoGroups({ groups }: { groups: readonly ToDoGroup[] }) {
	return groups.map((group, index) => (
		<LedgerGroup key={group.when} when={group.when} note={group.note}>
			{group.rows.map((row, at) => (
				<Row key={row.key} row={row} isFirst={index === 0 && at === 0} />
			))}
		</LedgerGroup>
	))
}

/** The first thing to do has the one filled button of the page. */
function Row({ row, isFirst }: { row: ToDoRow; isFirst: boolean }) {
	const variant = isFirst ? "primary" : "second"
	const sent = useNavigation().formData
	const isConfirming = sent?.get("intent") === "confirm-whole" && sent.get("day") === row.confirmAll?.day
	const action = row.confirmAll ? (
		<Form method="post" preventScrollReset>
			<input type="hidden" name="day" value={row.confirmAll.day} />
			<Button
				variant={variant}
				name="intent"
				value="confirm-whole"
				aria-keyshortcuts="y"
				busy={isConfirming}
				busyLabel="Confirming"
			>
				{row.confirmAll.label}
			</Button>
		</Form>
	) : (
		row.link && (
			<ButtonLink
				variant={variant}
				icon={row.link.icon}
				to={row.link.to}
				aria-label={`${row.link.label}: ${row.link.about}`}
			>
				{row.link.label}
			</ButtonLink>
		)
	)
	return (
		<LedgerRow name={row.name} line={row.line} strip={stripOf(row)} action={action}>
			{row.orders && (
				<ul className="waiting-orders">
					{row.orders.map((order, index) => (
						<WaitingOrder key={order.number} order={order} isFirst={isFirst && !row.confirmAll && index === 0} />
					))}
				</ul>
			)}
			{row.rest && (
				<Link className="inline-block py-2" to={row.rest.to}>
					{row.rest.label}
				</Link>
			)}
		</LedgerRow>
	)
}

function stripOf({ strip }: ToDoRow): ReactNode {
	if (!strip) return undefined
	const caption = (
		<>
			{strip.caption}
			{strip.short && (
				<>
					, <span className="short">{strip.short}</span>
				</>
			)}
		</>
	)
	return <FillStrip runs={strip.runs} caption={caption} />
}

function WaitingOrder({ order, isFirst }: { order: WaitingOrderRow; isFirst: boolean }) {
	const variant = isFirst ? "primary" : "second"
	return (
		<li className="waiting-order">
			<Link className="waiting-store" to={order.to}>
				{order.storeName}
			</Link>
			<span className="waiting-line">{order.line}</span>
			<span className="money waiting-money">{order.money}</span>
			{order.isWhole ? (
				<Form method="post" preventScrollReset className="waiting-action">
					<input type="hidden" name="number" value={order.number} />
					<Button
						variant={variant}
						size="small"
						name="intent"
						value="confirm"
						aria-label={`Confirm order ${order.number} of ${order.storeName}`}
					>
						Confirm
					</Button>
				</Form>
			) : (
				<span className="waiting-action">
					<ButtonLink
						variant={variant}
						size="small"
						to={order.to}
						aria-label={`Decide what order ${order.number} of ${order.storeName} gets`}
					>
						Decide
					</ButtonLink>
				</span>
			)}
		</li>
	)
}

/** An invoice past its due day. */
export type OwedRow = { number: string; storeName: string; to: string; due: string; late: string; money: string }

/** What is owed past its day, the one due first. */
export function Owed({ invoices }: { invoices: readonly OwedRow[] }) {
	if (invoices.length === 0) return null
	return (
		<LedgerGroup when="Owed">
			<ul className="waiting-orders owed">
				{invoices.map(({ number, storeName, to, due, late, money }) => (
					<li className="waiting-order" key={number}>
						<span className="waiting-store">{storeName}</span>
						<span className="waiting-line">
							Invoice {number}, due {due} <span className="short">{late}</span>
						</span>
						<span className="money waiting-money">{money}</span>
						<span className="waiting-action">
							<ButtonLink size="small" to={to} aria-label={`Open invoice ${number} of ${storeName}`}>
								Open it
							</ButtonLink>
						</span>
					</li>
				))}
			</ul>
		</LedgerGroup>
	)
}
