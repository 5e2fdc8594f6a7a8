import { Link } from "react-router"

type Line = { code: string; name: string; piecesPerCase: number; lots: readonly { code: string; pieces: number }[] }

/** Which lot fills which line, once an order is packed. */
export function PackedLots({ lines, lotsHref }: { lines: readonly Line[]; lotsHref: string }) {
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
		</section>
	)
}
