import type { ReactNode } from "react"
import { Book } from "~/ui/layout/book"
import type { DeskFrame } from "./frame.server"

/** A page of the desk: the frame its loader has read, and the sheet. `ruled` sets a column for margin notes. */
export function DeskBook({ frame, ruled, children }: { frame: DeskFrame; ruled?: boolean; children: ReactNode }) {
	return (
		<Book masthead={frame.masthead} ribbon={frame.ribbon} tabs={frame.tabs} ruled={ruled}>
			{children}
		</Book>
	)
}
