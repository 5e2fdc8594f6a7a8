import type { ReactNode } from "react"
import { formatMoney } from "~/domain/money"
import { type LateLine, lateLineWords, lateSums } from "~/domain/orders/late-change"

type ProposalProps = {
	title: ReactNode
	reason: string
	/** Who asked, and when. */
	asked: string
	lines: readonly (LateLine & { name: string })[]
	/** What can be done about it: forms. */
	children: ReactNode
}

/** A change that waits for the store's answer: what differs, why, and what the lines come to. */
export function Proposal({ title, reason, asked, lines, children }: ProposalProps) {
	const { beforeCents, afterCents } = lateSums(lines)
	return (
		<section className="proposal" aria-labelledby="proposal">
			<h2 className="name text-figure" id="proposal">
				{title}
			</h2>
			<blockquote>{reason}</blockquote>
			<ul>
				{lines.map((line) => (
					<li key={line.lineId}>
						<b>{line.name}</b>: {lateLineWords(line)}.
					</li>
				))}
			</ul>
			<p>
				{lines.length === 1 ? "This line comes" : "These lines come"} to{" "}
				<b className="fig">{formatMoney(afterCents)}</b> in place of{" "}
				<span className="fig">{formatMoney(beforeCents)}</span>. <span className="note">{asked}</span>
			</p>
			<div className="mt-3 flex flex-wrap gap-3">{children}</div>
		</section>
	)
}
