import type { Fault } from "~/domain/grading/faults"
import { gradeCautions } from "~/domain/grading/grade-cautions"

/** A grade with every reason that kept the lot from a better one, and what it asks of the seller. */
export function GradeResult({
	grade,
	reasons,
	colour,
	faults,
	title = `Grade: ${grade}`,
}: {
	grade: string
	reasons: readonly string[]
	/** The colour by name, in words. */
	colour: string | null
	faults: readonly Fault[]
	title?: string
}) {
	return (
		<>
			<section className="lot-part" aria-labelledby="grade-head">
				<h2 className="name" id="grade-head">
					{title}
				</h2>
				{colour !== null && <p>Colour: {colour}.</p>}
				{reasons.length === 0 ? (
					<p>Nothing keeps it from a better grade.</p>
				) : (
					<ul className="reason-list">
						{reasons.map((reason) => (
							<li key={reason}>{reason}</li>
						))}
					</ul>
				)}
			</section>
			{gradeCautions({ grade, faults }).map((caution) => (
				<section className="lot-part" key={caution.title}>
					<h3 className="name">{caution.title}</h3>
					<p>
						{caution.words} <span className="note">Source: {caution.source}. Other places have other rules.</span>
					</p>
				</section>
			))}
		</>
	)
}
