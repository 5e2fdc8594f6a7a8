import type { ReactNode } from "react"
import { Masthead, type MastheadProps } from "./masthead"
import { FortnightRibbon, type FortnightRibbonProps } from "./ribbon"
import { type Tab, ThumbIndex } from "./thumb-index"

type BookProps = {
	masthead: MastheadProps
	ribbon?: FortnightRibbonProps
	tabs: readonly Tab[]
	/** Rules a margin column for notes at the right of the sheet, at full height. */
	ruled?: boolean
	children: ReactNode
}

/** The first stop of the Tab key: past the band to the words. */
export function SkipLink() {
	return (
		<a className="skip-link" href="#sheet">
			Skip to the sheet
		</a>
	)
}

/** The frame of desk and portal: the band of time, the sheet, and the thumb index at its edge. */
export function Book({ masthead, ribbon, tabs, ruled = false, children }: BookProps) {
	return (
		<>
			<SkipLink />
			<div className="band">
				<Masthead {...masthead} />
				{ribbon && (
					<div className="band-ribbon">
						<FortnightRibbon {...ribbon} />
					</div>
				)}
			</div>
			<div className="book">
				<main className={ruled ? "sheet ruled" : "sheet"} id="sheet" tabIndex={-1}>
					{children}
				</main>
				<ThumbIndex tabs={tabs} account={masthead.person} />
			</div>
		</>
	)
}
