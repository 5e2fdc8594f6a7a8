import type { ReactNode } from "react"
import type { PartFill } from "./fill-key"

type PartBar = {
	key: string
	name: ReactNode
	parts: readonly { fill: PartFill; amount: number }[]
	/** What the bar says, right of it. */
	words: ReactNode
	/** The same for those who do not see the bar. */
	label: string
}

/** One bar a row, each divided into parts; the longest fills the width. */
export function PartBars({
	label,
	bars,
	isWordy = false,
}: {
	label: string
	bars: readonly PartBar[]
	/** The words are more than a figure: on a phone they stand below their bar. */
	isWordy?: boolean
}) {
	const sum = ({ parts }: PartBar) => parts.reduce((all, { amount }) => all + amount, 0)
	const most = Math.max(1, ...bars.map(sum))
	return (
		<ul className={isWordy ? "part-bars wordy" : "part-bars"} aria-label={label}>
			{bars.map((bar) => (
				<li key={bar.key}>
					<span className="part-name">{bar.name}</span>
					<Bar bar={bar} most={most} />
					<span className="part-words">{bar.words}</span>
				</li>
			))}
		</ul>
	)
}

function Bar({ bar, most }: { bar: PartBar; most: number }) {
	const share = (amount: number) => `${Math.round((amount / most) * 10_000) / 100}%`
	let before = 0
	return (
		<svg className="part-bar" width="100%" height="18" role="img" aria-label={bar.label}>
			{bar.parts.map(({ fill, amount }) => {
				const from = before
				before += amount
				if (amount === 0) return null
				return <rect key={fill} className={fill} x={share(from)} y="1" width={share(amount)} height="16" />
			})}
		</svg>
	)
}
