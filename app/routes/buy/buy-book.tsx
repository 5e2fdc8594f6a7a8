import type { ReactNode } from "react"
import { Book } from "~/ui/layout/book"
import type { BuyFrame } from "./frame.server"

/** A store's page: the frame its loader has read, and the sheet. `ruled` sets a column for margin notes. */
export function BuyBook({ frame, ruled, children }: { frame: BuyFrame; ruled?: boolean; children: ReactNode }) {
	return (
		<Book masthead={frame.masthead} ribbon={frame.ribbon} tabs={frame.tabs} ruled={ruled}>
			{children}
		</Book>
	)
}
