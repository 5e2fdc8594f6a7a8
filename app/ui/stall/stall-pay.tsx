import type { ReactNode } from "react"

type StallPayProps = {
	/** "3 pieces", and below it the way to start again. */
	children: ReactNode
	total: string
	/** The buttons for cash and for card. */
	ways?: ReactNode
}

/** The foot of a sale: what it comes to, and the ways to pay. Always in sight. */
export function StallPay({ children, total, ways }: StallPayProps) {
	return (
		<section className="stall-pay" aria-label="Total and payment">
			<div className="total">
				<div>{children}</div>
				<b>{total}</b>
			</div>
			{ways && <div className="ways">{ways}</div>}
		</section>
	)
}

type GiveBackProps = {
	total: string
	/** Bills and coins, largest first; `words` such as "two quarters". */
	pieces: readonly { cents: number; count: number; words: string; amount: string }[]
	/** Said instead of the list when there is nothing to give back, or too little was given: "2.50 more". */
	message?: ReactNode
	label?: string
}

/** What to give back, drawn as the bills and coins to take from the box. */
export function GiveBack({ total, pieces, message, label = "Give back" }: GiveBackProps) {
	return (
		<section className="give-back" aria-live="polite">
			<div className="total">
				<span>{label}</span>
				<b>{total}</b>
			</div>
			{message && <p className="text-figure">{message}</p>}
			<ul>
				{pieces.map((piece) => (
					<li key={piece.cents}>
						{piece.cents >= 100 ? <Bill cents={piece.cents} /> : <Coins cents={piece.cents} count={piece.count} />}
						<span>{piece.words}</span>
						<span className="money font-semibold">{piece.amount}</span>
					</li>
				))}
			</ul>
		</section>
	)
}

function Bill({ cents }: { cents: number }) {
	return (
		<svg className="money-drawing" width={100} height={46} viewBox="0 0 100 46" aria-hidden="true">
			<rect className="edge" x={1} y={1} width={98} height={44} rx={2} />
			<rect className="inner" x={6} y={6} width={88} height={34} />
			<circle className="inner" cx={50} cy={23} r={13} />
			<text x={50} y={28.5}>
				{cents / 100}
			</text>
		</svg>
	)
}

/** At most two coins are drawn; the words count them. */
function Coins({ cents, count }: { cents: number; count: number }) {
	return (
		<svg className="money-drawing" width={100} height={48} viewBox="0 0 100 48" aria-hidden="true">
			{[24, 72].slice(0, count).map((x) => (
				<g key={x}>
					<circle className="edge" cx={x} cy={24} r={21} />
					<circle className="inner" cx={x} cy={24} r={17} strokeDasharray="1.5 2" />
					<text x={x} y={29.5}>
						{cents}
					</text>
				</g>
			))}
		</svg>
	)
}
