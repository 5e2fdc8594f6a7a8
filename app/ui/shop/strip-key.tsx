import { FillStrip } from "~/ui/stock/fill-strip"
import type { StockState } from "~/ui/stock/strip-geometry"

/** How the strips are read: three cells of each state, with its words. */
export function StripKey({ runs }: { runs: readonly { state: StockState; words: string }[] }) {
	return (
		<ul className="strip-key">
			{runs.map(({ state, words }) => (
				<li key={state}>
					<span aria-hidden="true">
						<FillStrip runs={[{ state, count: 3 }]} size="sm" />
					</span>
					{words}
				</li>
			))}
		</ul>
	)
}
