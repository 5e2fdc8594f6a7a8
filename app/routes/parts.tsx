import { Mark } from "~/ui/icons"
import { ControlParts } from "~/ui/parts/control-parts"
import { LedgerParts } from "~/ui/parts/ledger-parts"
import { RibbonParts } from "~/ui/parts/ribbon-parts"
import { StallParts } from "~/ui/parts/stall-parts"
import { StockParts } from "~/ui/parts/stock-parts"
import { ValueParts } from "~/ui/parts/value-parts"

export const meta = () => [{ title: "Parts of the book · Waxbill" }]

/** Nothing of anyone's: the parts that pages are made of, for those who build them and for the accessibility test. */
export const loader = () => null

export default function Parts() {
	return (
		<div className="bg-sheet px-4 pb-12 desk:px-12">
			<header className="flex flex-wrap items-center gap-x-5 gap-y-2 border-b-3 border-double border-ink pt-7 pb-4">
				<Mark size={52} />
				<h1 className="title">Parts of the book</h1>
				<p className="text-ink-soft desk:ml-auto">Every state of every part</p>
			</header>
			<main id="sheet">
				<StockParts />
				<RibbonParts />
				<ControlParts />
				<LedgerParts />
				<StallParts />
				<ValueParts />
			</main>
		</div>
	)
}
