import { SECTION_STATES, type SectionState } from "~/domain/crop/super-drawing"
import { SectionSign } from "~/ui/stock/super-block"

const WORDS: Record<SectionState, string> = {
	bare: "bare",
	begun: "begun",
	filling: "filling",
	full: "full, open",
	capped: "capped",
}

/** What the sections of a super mean, one sign each. */
export function SuperKey() {
	return (
		<ul className="super-key" aria-label="What the sections mean">
			{SECTION_STATES.map((state) => (
				<li key={state}>
					<SectionSign state={state} />
					{WORDS[state]}
				</li>
			))}
		</ul>
	)
}
