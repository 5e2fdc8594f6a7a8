import { type ReactNode, useId } from "react"
import { Link } from "react-router"

type LedgerGroupProps = {
	/** When, or what the rows have in common: "Before noon tomorrow". */
	when: ReactNode
	/** One reason for all rows of the group. Rows of a group without one may carry their own. */
	note?: ReactNode
	children: ReactNode
}

/** Rows under one head, ruled off in ink. */
export function LedgerGroup({ when, note, children }: LedgerGroupProps) {
	const headId = useId()
	return (
		<section className={note ? "ledger-group has-note" : "ledger-group"} aria-labelledby={headId}>
			<h2 id={headId}>{when}</h2>
			<div className="ledger-rows">{children}</div>
			{note && <div className="aside margin-rule">{note}</div>}
		</section>
	)
}

/** Rows that need no group head, from the sheet's left edge. */
export function LedgerList({ children }: { children: ReactNode }) {
	return <div className="ledger-plain">{children}</div>
}

type LedgerRowProps = {
	name: ReactNode
	/** The name's link; the whole row is its target. */
	href?: string
	line?: ReactNode
	/** A fill strip, or words in its place. */
	strip?: ReactNode
	action?: ReactNode
	/** The reason, in the margin beside this row. */
	note?: ReactNode
	/** Lines that belong to this row, below it. */
	children?: ReactNode
	/** `settled` is done, struck through; `chosen` is what the page is about. */
	state?: "rest" | "chosen" | "settled"
}

/** What there is to settle: a name and one line, how much of it, and the one thing to do. */
export function LedgerRow({ name, href, line, strip, action, note, children, state = "rest" }: LedgerRowProps) {
	return (
		<article className={state === "rest" ? "ledger-row" : `ledger-row ${state}`}>
			<div className={strip ? "ledger-main has-strip" : "ledger-main"}>
				<div className="min-w-0">
					<h3 className="name">
						{href ? (
							<Link className="row-link" to={href}>
								{name}
							</Link>
						) : (
							name
						)}
					</h3>
					{line && <p className="row-line">{line}</p>}
				</div>
				{strip && <div className="min-w-0">{strip}</div>}
				{action && <div className="row-action">{action}</div>}
				{children && <div className="row-more">{children}</div>}
			</div>
			{note && <div className="aside margin-rule">{note}</div>}
		</article>
	)
}

/** A row whose facts are still on their way: three ruled lines. */
export function WaitingRow() {
	return (
		<div className="ledger-row" aria-busy="true">
			<div className="ledger-main has-strip">
				<span className="row-waiting" />
				<span className="row-waiting" />
				<span className="row-waiting" />
			</div>
		</div>
	)
}
