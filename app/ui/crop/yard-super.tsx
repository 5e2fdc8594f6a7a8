import { useRef } from "react"
import { type Day, dayWords, monthDay } from "~/domain/calendar"
import { sectionsOf } from "~/domain/crop/super-drawing"
import { SuperBlock } from "~/ui/stock/super-block"
import { CheckForm, type CheckFormProps, type CheckPlace } from "./check-form"
import { sharesWords } from "./check-words"
import type { KeptChecksState } from "./kept-checks-hook"
import type { CheckedSuper } from "./kept-checks-store"

type Seen = { checkedOn: Day; filledPercent: number; cappedPercent: number; sections: string }

export type YardSuperProps = {
	place: CheckPlace
	book: KeptChecksState
	about: CheckedSuper
	/** Its product, in words. */
	line: string
	clearingOn: Day | null
	last: (Seen & { note: string }) | null
	href: string
	checkId: string
	/** What was posted for it without script, and why it was not taken. */
	given?: Pick<CheckFormProps, "fields" | "errors">
}

/** One super of the round: as it was last seen, and its form behind one button. */
export function YardSuper({ place, book, about, line, clearingOn, last, href, checkId, given }: YardSuperProps) {
	const opener = useRef<HTMLDetailsElement>(null)
	const waiting = book.kept.findLast((check) => check.about.id === about.id && check.refused === null)
	const taken = book.taken.findLast((check) => check.about.id === about.id)
	const seen = latestOf(last, taken?.seen, waiting?.seen)
	return (
		<article className="yard-super">
			<SeenBlock about={about} seen={seen} />
			<div className="min-w-0">
				<h3 className="name">{about.name}</h3>
				<p className="row-line">{line}</p>
				<p className="row-line">
					{seen
						? `${dayWords(seen.checkedOn)}: ${sharesWords(seen)}`
						: `Set on ${monthDay(about.setOn)}, not looked into yet`}
					{waiting && "; waits for signal"}
					{clearingOn && `. Bee escape in since ${monthDay(clearingOn)}`}
				</p>
				{last?.note && <p className="aside">{last.note}</p>}
				<a className="yard-link" href={href}>
					All its checks<span className="sr-only">: {about.name}</span>
				</a>
			</div>
			<details className="check-opener" name="check" open={given !== undefined} ref={opener}>
				<summary className="btn">
					Check it<span className="sr-only">: {about.name}</span>
				</summary>
				<CheckForm
					id={`check-${about.id}`}
					{...{ place, about, last, checkId, ...given }}
					onKeep={async (check) => {
						await book.keep(check)
						if (opener.current) opener.current.open = false
						opener.current?.querySelector("summary")?.focus()
					}}
				/>
			</details>
		</article>
	)
}

/** The drawing of what was seen. */
export function SeenBlock({
	about,
	seen,
}: {
	about: Pick<CheckedSuper, "name" | "capacityPieces">
	seen: Seen | null
}) {
	const label = seen ? `${about.name} from above: ${sharesWords(seen)}` : `${about.name}: not looked into yet`
	const sections = sectionsOf({ capacityPieces: about.capacityPieces, checks: seen ? [seen] : [] })
	return <SuperBlock sections={sections} label={label} />
}

function latestOf(...seen: (Seen | null | undefined)[]): Seen | null {
	// Of one day the later in the list was made later.
	return seen.reduce<Seen | null>((best, one) => (one && (!best || one.checkedOn >= best.checkedOn) ? one : best), null)
}
