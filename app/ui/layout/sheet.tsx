import type { ReactNode } from "react"
import { Icon } from "~/ui/icons"

type SheetHeadProps = {
	title: ReactNode
	lead?: ReactNode
	/** Stands in the margin on a ruled sheet. */
	note?: ReactNode
	action?: ReactNode
}

/** The head of a sheet: one title, one sentence, and what the reader should know first in the margin. */
export function SheetHead({ title, lead, note, action }: SheetHeadProps) {
	return (
		<header className="sheet-head">
			<div className="min-w-0">
				<h1 className="title">{title}</h1>
				{lead && <p className="lead">{lead}</p>}
			</div>
			{note && <div className="aside">{note}</div>}
			{action && <div className="head-action">{action}</div>}
		</header>
	)
}

/** A reason or a hint beside what it is about: 120 characters at most. It goes when the reason goes. */
export function MarginNote({ children }: { children: ReactNode }) {
	return <p className="aside margin-rule">{children}</p>
}

/** Says that there is nothing, in one sentence, and what comes next. */
export function EmptyLine({ children, action }: { children: ReactNode; action?: ReactNode }) {
	return (
		<div className="empty-line">
			<p>{children}</p>
			{action}
		</div>
	)
}

type MessageLineProps = {
	/** Something was done; it could not be done; there is no signal. */
	tone: "saved" | "problem" | "signal"
	title: ReactNode
	children?: ReactNode
	action?: ReactNode
}

/** What a whole page has to say, at the top of the sheet. Read out when it appears: a problem at once. */
export function MessageLine({ tone, title, children, action }: MessageLineProps) {
	return (
		<div className={`message-line ${tone}`} role={tone === "problem" ? "alert" : "status"}>
			{tone === "saved" && <Icon name="tick" size={18} />}
			{tone === "signal" && <Icon name="no-signal" size={18} />}
			<p>
				<b>{title}</b> {children}
			</p>
			{action}
		</div>
	)
}

/** A list of sums, each with its words. Holds `TotalsRow`s. */
export function Totals({ children }: { children: ReactNode }) {
	return <dl className="totals">{children}</dl>
}

type TotalsRowProps = {
	label: ReactNode
	value: ReactNode
	/** A unit or a second figure, small, after the label. */
	note?: ReactNode
	/** `strong` is the figure that counts; `sum` stands under a rule with a double line below. */
	weight?: "plain" | "strong" | "sum"
}

/** One sum of a `Totals` list. */
export function TotalsRow({ label, value, note, weight = "plain" }: TotalsRowProps) {
	return (
		<div className={weight === "plain" ? "totals-row" : `totals-row ${weight}`}>
			<dt>
				{label} {note && <span className="note">{note}</span>}
			</dt>
			<dd className="money">{value}</dd>
		</div>
	)
}
