type Move = {
	id: string
	/** For machines, and for people. */
	at: string
	when: string
	from: string
	to: string
	reason: string
	who: string | null
	pieces: number
}

/** How the pieces of a lot came where they are, the latest move first. */
export function LotMoves({ moves }: { moves: readonly Move[] }) {
	return (
		<table className="sheet-table beside-margin mt-6">
			<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">
				How they came there, the latest first
			</caption>
			<thead>
				<tr>
					<th scope="col">When</th>
					<th scope="col">Move</th>
					<th scope="col" className="max-desk:hidden">
						Why
					</th>
					<th scope="col" className="max-desk:hidden">
						Who
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Pieces
					</th>
				</tr>
			</thead>
			<tbody>
				{moves.map((move) => (
					<tr key={move.id}>
						<td>
							<time dateTime={move.at}>{move.when}</time>
						</td>
						<td>
							{move.from} to {move.to.toLowerCase()}
							<span className="note block desk:hidden">{move.reason}</span>
						</td>
						<td className="max-desk:hidden">{move.reason}</td>
						<td className="max-desk:hidden">{move.who ?? "by itself"}</td>
						<td className="num fig pr-4! desk:pr-8!">{move.pieces}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}
