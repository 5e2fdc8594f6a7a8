import { Link } from "react-router"

type Line = { code: string; name: string; piecesPerCase: number; lots: readonly { code: string; pieces: number }[] }

/** Which lot fills which line, once an order is packed; `historyHref` is where it says what those lots came from. */
export function PackedLots({
	lines,
	lotsHref,
	historyHref,
}: {
	lines: readonly Line[]
	lotsHref: string
	historyHref: string
}) {
	const filled = lines.filter((line) => line.lots.length > 0)
	if (filled.length === 0) return null
	return (
		<section aria-labelledby="packed-lots" className="mb-4">
			<h2 className="head-italic" id="packed-lots">
				Packed from
			</h2>
			<ul className="mt-2 grid gap-1">
				{filled.map((line) => (
					<li key={line.code}>
						{line.name}:{" "}
						{line.lots.map((lot, index) => (
							<span key={lot.code}>
								{index > 0 && ", "}
								lot{" "}
								<Link className="inline-block py-0.5" to={`${lotsHref}/${lot.code}`}>
									{lot.code}
								</Link>
								, {lot.pieces} pieces
							</span>
						))}
					</li>
				))}
			</ul>
			<Link className="inline-block py-1" to={historyHref}>
				Where these lots come from
			</Link>
		</section>
	)
}
