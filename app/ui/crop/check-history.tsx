import { type Day, fullDay } from "~/domain/calendar"
import { sharesWords } from "./check-words"
import type { CheckedSuper } from "./kept-checks-store"
import { SeenBlock } from "./yard-super"

type CheckHistoryProps = {
	about: CheckedSuper
	/** The latest first. */
	checks: readonly {
		id: string
		checkedOn: Day
		filledPercent: number
		cappedPercent: number
		sections: string
		note: string
		photoId: string | null
		who: string | null
	}[]
	/** The address that a photo's id is put behind. */
	photosHref: string
}

/** The looks into a super, each as it was drawn, with its note and photo. */
export function CheckHistory({ about, checks, photosHref }: CheckHistoryProps) {
	return (
		<ol className="check-history">
			{checks.map((check) => (
				<li key={check.id}>
					<SeenBlock about={about} seen={check} />
					<div className="min-w-0">
						<h3 className="name">
							<time dateTime={check.checkedOn}>{fullDay(check.checkedOn)}</time>
						</h3>
						<p className="row-line">
							{sharesWords(check)}
							{check.sections === "" && "; noted as shares, drawn as they usually lie"}
						</p>
						<p className="note">{check.who ?? "by nobody named"}</p>
						{check.note && <p className="aside">{check.note}</p>}
					</div>
					{check.photoId && (
						<a href={`${photosHref}/${check.photoId}`}>
							<img
								src={`${photosHref}/${check.photoId}`}
								alt={`${about.name} on ${fullDay(check.checkedOn)}`}
								loading="lazy"
							/>
						</a>
					)}
				</li>
			))}
		</ol>
	)
}
