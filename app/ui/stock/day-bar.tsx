import { rectangle } from "./strip-geometry"

/** Cases of one day, by state. */
export type DayStock = { promised?: number; free?: number; expected?: number; short?: number }

const WIDTH = 80
const HEIGHT = 11
/** Few cases on every day must not look like a full van. */
const MOST_PIXELS_A_CASE = 4

/** Pixels for one case, so that the fullest of `days` just fits the bar's 80 pixels. */
export function dayBarScale(days: readonly DayStock[]): number {
	const fullest = Math.max(
		1,
		...days.map((d) => (d.promised ?? 0) + (d.free ?? 0) + (d.expected ?? 0) + (d.short ?? 0)),
	)
	return Math.min(MOST_PIXELS_A_CASE, (WIDTH - 3.5) / fullest)
}

/** The bar under a day: the same code as the strip, without cells. The day's caption says it in words. */
export function DayBar({ promised = 0, free = 0, expected = 0, short = 0, scale }: DayStock & { scale: number }) {
	const freeAt = promised * scale
	const expectedAt = freeAt + free * scale
	const shortAt = expectedAt + expected * scale
	return (
		<svg className="day-bar" viewBox={`0 0 ${WIDTH} ${HEIGHT}`} preserveAspectRatio="none" aria-hidden="true">
			{promised > 0 && (
				<path className="c-promised" d={rectangle(0.75, 0.75, Math.max(1, promised * scale - 1.5), HEIGHT - 1.5)} />
			)}
			{free > 0 && <path className="c-free" d={rectangle(freeAt, 0, free * scale, HEIGHT)} />}
			{expected > 0 && (
				<path
					className="c-expected"
					d={rectangle(expectedAt + 0.5, HEIGHT - 4.5, Math.max(1, expected * scale - 1), 4)}
				/>
			)}
			{short > 0 && (
				<path
					className="c-short"
					strokeDasharray="4 2"
					d={`M${Math.round((shortAt + 2) * 10) / 10} ${HEIGHT - 1}h${Math.round((Math.max(10, short * scale) - 2) * 10) / 10}`}
				/>
			)}
		</svg>
	)
}
