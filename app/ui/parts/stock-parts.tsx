import type { SectionState } from "~/domain/crop/super-drawing"
import { FillStrip } from "~/ui/stock/fill-strip"
import { StockKey } from "~/ui/stock/stock-key"
import type { StockState } from "~/ui/stock/strip-geometry"
import { SuperBlock } from "~/ui/stock/super-block"
import { PartGroup, State, States } from "./shown"

const MEANINGS: [StockState, string, string][] = [
	["free", "Solid.", "Free to promise."],
	["held", "Hatched.", "Held: not yet frozen, weighed or released."],
	["promised", "Outlined.", "Promised to someone."],
	["expected", "Low and faded.", "Expected from the hives."],
	["short", "Bare line.", "Asked for, not there."],
]
const ONE_OF_EACH = [
	{ state: "free", count: 7 },
	{ state: "held", count: 4 },
	{ state: "promised", count: 6 },
	{ state: "expected", count: 5 },
	{ state: "short", count: 3 },
] as const

const row = (...sections: [SectionState, number][]) =>
	sections.flatMap(([state, count]) => Array.from({ length: count }, () => state))
const AT_WORK = [
	...row(["bare", 1], ["begun", 2], ["filling", 1], ["full", 2], ["filling", 2], ["begun", 1], ["bare", 1]),
	...row(["begun", 1], ["filling", 2], ["full", 1], ["capped", 3], ["full", 1], ["filling", 1], ["begun", 1]),
	...row(["begun", 1], ["filling", 1], ["full", 2], ["capped", 3], ["full", 1], ["filling", 1], ["begun", 1]),
	...row(["bare", 2], ["begun", 1], ["filling", 2], ["full", 1], ["filling", 2], ["begun", 1], ["bare", 1]),
]

/** How stock is drawn, in every state. */
export function StockParts() {
	return (
		<>
			<PartGroup title="Fill strip">
				<States>
					{MEANINGS.map(([state, name, meaning]) => (
						<State
							key={state}
							caption={
								<>
									<b>{name}</b> {meaning}
								</>
							}
						>
							<FillStrip size="lg" runs={[{ state, count: 5 }]} />
						</State>
					))}
				</States>
				<States>
					<State caption="The same with no colour at all: height, hatch and outline carry it.">
						<div className="grayscale">
							<FillStrip size="sm" runs={ONE_OF_EACH} />
						</div>
					</State>
					<State caption="Least acceptable, met.">
						<FillStrip
							size="lg"
							least={2}
							runs={[
								{ state: "free", count: 3 },
								{ state: "short", count: 2 },
							]}
						/>
					</State>
					<State caption="Not met: thicker, propolis, and in words.">
						<FillStrip
							size="lg"
							least={2}
							runs={[
								{ state: "free", count: 1 },
								{ state: "short", count: 2 },
							]}
							caption={<span className="short">1 of 3, under least</span>}
						/>
					</State>
					<State caption="Three sizes; a wider gap after every fifth cell.">
						<div className="flex items-end gap-4">
							<FillStrip size="sm" runs={[{ state: "free", count: 6 }]} />
							<FillStrip size="md" runs={[{ state: "free", count: 6 }]} />
							<FillStrip size="lg" runs={[{ state: "free", count: 6 }]} />
						</div>
					</State>
					<State caption="Empty is words.">
						<FillStrip runs={[]} />
					</State>
					<State caption="Waiting is one ruled line.">
						<FillStrip runs={[]} status="waiting" />
					</State>
					<State caption="Unknown is words, never an empty strip.">
						<FillStrip runs={[]} status="not-counted" />
					</State>
				</States>
				<States>
					<State caption="Over 40 cells a line breaks at 20.">
						<FillStrip
							size="sm"
							runs={[
								{ state: "free", count: 33 },
								{ state: "held", count: 14 },
							]}
							caption="33 free, 14 held until Friday"
						/>
					</State>
					<State caption="Over 120 a cell is five, and over 600 it is ten or more.">
						<FillStrip size="sm" runs={[{ state: "free", count: 240 }]} caption="240 free" />
					</State>
				</States>
				<StockKey />
			</PartGroup>
			<PartGroup title="Super from above">
				<States>
					<State caption="At work: it grows from the middle.">
						<SuperBlock sections={AT_WORK} label="15 % capped" />
					</State>
					<State
						caption={
							<>
								<b>Ready.</b> Take off.
							</>
						}
					>
						<SuperBlock sections={row(["capped", 40])} isReady label="100 % capped, take off" />
					</State>
					<State caption="Just set on.">
						<SuperBlock sections={row(["bare", 40])} label="Just set on" />
					</State>
					<State caption="Not looked at for 10 days: last seen August 3.">
						<SuperBlock sections={AT_WORK} isUnseen label="Last seen August 3" />
					</State>
					<State caption="A large box keeps its width.">
						<SuperBlock sections={row(["capped", 30], ["full", 30], ["bare", 60])} label="120 sections, 25 % capped" />
					</State>
					<State caption="Not read yet: the box alone.">
						<SuperBlock sections={[]} label="Not read yet" />
					</State>
				</States>
			</PartGroup>
		</>
	)
}
