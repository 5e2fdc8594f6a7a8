import type { ReactNode } from "react"
import { Mark } from "~/ui/icons"

type InvoicePaperProps = {
	yard: { name: string; contact: string }
	/** "Invoice 1203". */
	title: string
	/** In words: "August 18, 2026". */
	date: string
	/** To whom, what was delivered, by when to pay. */
	blocks: readonly { title: string; name: ReactNode; lines: readonly ReactNode[] }[]
	/** The lines, as a table with the class `paper-table`. */
	children: ReactNode
	/** Why something is missing, in the margin's hand. */
	note?: ReactNode
	/** How to keep comb, what to do about breakage. */
	care?: ReactNode
	/** The tear-off at the foot, sent back with a check. */
	slip?: readonly { label: string; value: ReactNode }[] | undefined
	/** One line of small print at the very foot. */
	fine?: ReactNode
}

/**
 * An invoice, credit or statement as a sheet of Letter paper. The screen and the printer show the same. Stands inside the
 * main part of a page; a page of nothing else brings its own `main`.
 */
export function InvoicePaper({ yard, title, date, blocks, children, note, care, slip, fine }: InvoicePaperProps) {
	return (
		<article className="paper">
			<header className="paper-head">
				<div>
					<p className="paper-yard">{yard.name}</p>
					<p>{yard.contact}</p>
				</div>
				<div className="desk:text-right print:text-right">
					<h1>{title}</h1>
					<p>{date}</p>
				</div>
			</header>
			<div className="paper-blocks">
				{blocks.map((block) => (
					<div key={block.title} className="min-w-0">
						<h2>{block.title}</h2>
						<p className="name">{block.name}</p>
						{block.lines.map((line, index) => (
							// biome-ignore lint/suspicious/noArrayIndexKey: fixed lines of an address, never reordered
							<p key={index}>{line}</p>
						))}
					</div>
				))}
			</div>
			{children}
			{(note || care) && (
				<div className="paper-notes">
					{note && <div className="aside margin-rule">{note}</div>}
					{care && <div>{care}</div>}
				</div>
			)}
			{slip && (
				<dl className="paper-slip">
					{slip.map(({ label, value }) => (
						<div key={label}>
							<dt>{label}</dt>
							<dd>{value}</dd>
						</div>
					))}
					<div className="note">
						<dt className="sr-only">What to do</dt>
						<dd className="!font-sans !text-note !font-normal">Tear here and send with a check.</dd>
					</div>
				</dl>
			)}
			<p className="paper-fine">
				<span>{fine}</span>
				<span className="flex items-center gap-1.5">
					<Mark size={16} /> Waxbill
				</span>
			</p>
		</article>
	)
}
