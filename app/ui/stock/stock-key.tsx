import { drawStrip, type StockState } from "./strip-geometry"

const MEANINGS: Record<StockState, string> = {
	free: "free to promise",
	held: "held: not yet frozen or weighed",
	promised: "promised",
	expected: "expected from the hives",
	short: "asked for, not there",
}

type StockKeyProps = {
	states?: readonly StockState[]
	/** Words that differ on this page, such as "left" for "free to promise" in the shop. */
	words?: Partial<Record<StockState, string>>
}

/** What the cells of a strip mean. */
export function StockKey({ states = ["free", "held", "promised", "expected", "short"], words = {} }: StockKeyProps) {
	return (
		<ul className="stock-key" aria-label="What the cells mean">
			{states.map((state) => (
				<li key={state}>
					<svg className="strip" width={19} height={12} viewBox="0 0 19 12" aria-hidden="true">
						<path className={`c-${state}`} d={drawStrip([{ state, count: 3 }], "sm")?.paths[0]?.d} />
					</svg>
					<span>{words[state] ?? MEANINGS[state]}</span>
				</li>
			))}
		</ul>
	)
}
