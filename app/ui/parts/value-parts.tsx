import { PartGroup, States } from "./shown"

const COLOURS: [ground: string, name: string, use: string][] = [
	["bg-wax", "wax", "page ground"],
	["bg-sheet", "sheet", "the sheet"],
	["bg-basswood", "basswood", "totals, hover"],
	["bg-ink", "ink", "names, figures"],
	["bg-ink-soft", "ink-soft", "second lines"],
	["bg-ink-faint", "ink-faint", "captions"],
	["bg-tin", "tin", "the band of time"],
	["bg-tin-deep", "tin-deep", "threads, glyphs"],
	["bg-line", "line", "edges of controls"],
	["bg-clover", "clover", "can do, chosen, written"],
	["bg-clover-wash", "clover-wash", "chosen row"],
	["bg-propolis", "propolis", "short, late, refused"],
	["bg-stock", "stock", "solid cell"],
	["bg-stock-line", "stock-line", "outline and hatch"],
	["bg-stock-faint", "stock-faint", "expected"],
	["bg-honey-straw", "honey-straw", "honey colour: straw"],
	["bg-honey-light", "honey-light", "light amber"],
	["bg-honey-amber", "honey-amber", "amber"],
	["bg-honey-dark", "honey-dark", "dark amber"],
]
const SIZES: [name: string, style: string, sample: string][] = [
	["display 66", "font-display text-display", "The clover comb"],
	["title 40", "font-display text-title", "Order for Tuesday, August 18"],
	["head 26", "font-display text-head font-semibold", "$1,118.00"],
	["entry 19", "font-display text-entry font-semibold", "Basswood section, clover"],
	["figure 20", "fig text-figure font-semibold", "0123456789 108.30 142.50"],
	["body 17", "text-body", "Six things to settle. The first two close at noon tomorrow."],
	["table 15", "text-table", "Nine stores ask for 31 cases of Fancy. Eighteen can be ready."],
	["note 13", "text-note", "16 free, 6 held until Friday"],
]

/** Colours and sizes of type. */
export function ValueParts() {
	return (
		<>
			<PartGroup title="Colour">
				<States>
					{COLOURS.map(([ground, name, use]) => (
						<div key={name} className="grid grid-cols-[44px_minmax(0,1fr)] items-center gap-2.5 text-note">
							<span className={`h-11 border border-rule ${ground}`} />
							<span>
								<b>{name}</b>
								<br />
								{use}
							</span>
						</div>
					))}
				</States>
			</PartGroup>
			<PartGroup title="Type">
				<div>
					{SIZES.map(([name, style, sample]) => (
						<div
							key={name}
							className="grid items-baseline border-t border-rule py-2 first:border-t-0 desk:grid-cols-[190px_minmax(0,1fr)]"
						>
							<span className="note">{name}</span>
							<span className={style}>{sample}</span>
						</div>
					))}
				</div>
			</PartGroup>
		</>
	)
}
