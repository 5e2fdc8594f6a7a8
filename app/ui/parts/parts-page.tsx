import { Mark } from "~/ui/icons"
import { ControlParts } from "./control-parts"
import { LedgerParts } from "./ledger-parts"
import { PageParts } from "./page-parts"
import { RibbonParts } from "./ribbon-parts"
import { StallParts } from "./stall-parts"
import { StockParts } from "./stock-parts"
import { ValueParts } from "./value-parts"

/** The parts that pages are made of, for those who build them and for the accessibility test. */
export function PartsPage() {
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
				<PageParts />
				<StallParts />
				<ValueParts />
			</main>
		</div>
	)
}
