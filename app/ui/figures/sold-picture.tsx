import { type SoldSpan, type Span, spanWords } from "~/domain/figures/spans"
import { formatMoney } from "~/domain/money"
import { FillKey } from "./fill-key"

const LEFT = 16
const STEP = 64
const BAR = 34
const TOP = 20
const HEIGHT = 140
const FOOT = 22

/** Whole dollars, for a label over a bar. */
const dollars = (cents: number) => formatMoney(Math.round(cents / 100) * 100).replace(".00", "")

/**
 * Sales by week, month or year: what stores bought is the solid foot of each bar, what was sold at the stall stands on it,
 * outlined. Each bar says its sum. The table below has the same figures.
 */
export function SoldPicture({ spans, span }: { spans: readonly SoldSpan[]; span: Span }) {
	const most = Math.max(1, ...spans.map(({ storeCents, stallCents }) => storeCents + stallCents))
	const tall = (cents: number) => Math.round((cents / most) * HEIGHT)
	const width = LEFT * 2 + spans.length * STEP
	const height = TOP + HEIGHT + FOOT
	const line = TOP + HEIGHT
	const words = spans.map(
		({ startOn, storeCents, stallCents }) =>
			`${spanWords(startOn, span)} stores ${dollars(storeCents)}, stall ${dollars(stallCents)}`,
	)
	return (
		<>
			<FillKey
				fills={[
					["money-in", "stores"],
					["money-out", "stall"],
				]}
			/>
			{/* biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls sideways is reached by keyboard */}
			<section className="books-picture" aria-label={`Sales by ${span}, drawn`} tabIndex={0}>
				<svg
					width={width}
					height={height}
					viewBox={`0 0 ${width} ${height}`}
					role="img"
					aria-label={`Sales by ${span}: ${words.join("; ")}`}
				>
					{spans.map(({ startOn, storeCents, stallCents }, index) => {
						const x = LEFT + index * STEP + (STEP - BAR) / 2
						const [stores, both] = [tall(storeCents), tall(storeCents + stallCents)]
						return (
							<g key={startOn}>
								{stores > 0 && <path className="money-in" d={`M${x} ${line}v${-stores}h${BAR}v${stores}z`} />}
								{both > stores && (
									<path
										className="money-out"
										d={`M${x + 0.5} ${line - stores}v${stores - both + 0.5}h${BAR - 1}v${both - stores - 0.5}z`}
									/>
								)}
								{storeCents + stallCents > 0 && (
									<text className="fc-word" x={x + BAR / 2} y={line - both - 5} textAnchor="middle">
										{dollars(storeCents + stallCents)}
									</text>
								)}
								<text className="fc-word" x={x + BAR / 2} y={height - 6} textAnchor="middle">
									{spanWords(startOn, span)}
								</text>
							</g>
						)
					})}
					<path className="money-line" d={`M${LEFT} ${line + 0.5}H${width - LEFT}`} />
				</svg>
			</section>
		</>
	)
}
