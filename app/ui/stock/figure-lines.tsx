import type { ReactNode } from "react"
import { Link } from "react-router"
import { piecesWords } from "~/domain/quantity"

type FigureLine = {
	key: string
	/** A lot, an order; linked where the reader may follow it. */
	name: string
	to: string | null
	/** What it is, and when. */
	about: string
	when: string
	/** Why it counts though it is not there that day, or why it does not count. */
	note: string
	pieces: number
}

/** Lines of one kind: those shown, and how many pieces stand in lines beyond them. */
export type FigurePart = { lines: readonly FigureLine[]; restLines: number; restPieces: number }

type FigureLinesProps = {
	caption: string
	heads: { name: string; about: string; when: string }
	counted: FigurePart
	sum: { words: string; pieces: number }
	apart: FigurePart
	apartWords: string
	empty: ReactNode
}

/** The lines that make a figure with their sum below, and, after it, those that are left out and why. */
export function FigureLines({ caption, heads, counted, sum, apart, apartWords, empty }: FigureLinesProps) {
	const isEmpty = counted.lines.length === 0 && apart.lines.length === 0
	return (
		<table className="sheet-table mt-4">
			<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">{caption}</caption>
			<thead>
				<tr>
					<th scope="col">{heads.name}</th>
					<th scope="col" className="max-desk:hidden">
						{heads.about}
					</th>
					<th scope="col" className="max-desk:hidden">
						{heads.when}
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Pieces
					</th>
				</tr>
			</thead>
			<tbody>
				{isEmpty && (
					<tr>
						<td colSpan={4} className="head-italic">
							{empty}
						</td>
					</tr>
				)}
				<PartRows part={counted} />
				<tr className="figure-sum">
					<td colSpan={3} className="max-desk:hidden">
						{sum.words}
					</td>
					<td className="pl-4! desk:hidden">{sum.words}</td>
					<td className="num fig pr-4! desk:pr-8!">{sum.pieces}</td>
				</tr>
			</tbody>
			{apart.lines.length > 0 && (
				<tbody className="figure-apart">
					<tr>
						<td colSpan={4} className="head-italic pt-4!">
							{apartWords}
						</td>
					</tr>
					<PartRows part={apart} />
				</tbody>
			)}
		</table>
	)
}

function PartRows({ part }: { part: FigurePart }) {
	return (
		<>
			{part.lines.map((line) => (
				<tr key={line.key}>
					<td>
						{line.to ? (
							<Link className="fig inline-block py-1" to={line.to}>
								{line.name}
							</Link>
						) : (
							<span className="fig">{line.name}</span>
						)}
						<span className="note block desk:hidden">
							{line.about}, {line.when}
						</span>
						{line.note && <span className="note block desk:hidden">{line.note}</span>}
					</td>
					<td className="max-desk:hidden">
						{line.about}
						{line.note && <span className="note block">{line.note}</span>}
					</td>
					<td className="max-desk:hidden">{line.when}</td>
					<td className="num fig pr-4! desk:pr-8!">{line.pieces}</td>
				</tr>
			))}
			{part.restLines > 0 && (
				<tr>
					<td colSpan={3} className="max-desk:hidden">
						{part.restLines} more lines
					</td>
					<td className="pl-4! desk:hidden">{part.restLines} more lines</td>
					<td className="num fig pr-4! desk:pr-8!" title={piecesWords(part.restPieces)}>
						{part.restPieces}
					</td>
				</tr>
			)}
		</>
	)
}
