import type { ReactNode } from "react"
import { piecesWords } from "~/domain/quantity"
import { photoWords } from "./breakage-words"

export type ShownLine = {
	id: string
	code: string
	name: string
	detail: string
	lotCodes: string
	pieces: number
	note: string
	acceptedPieces: number | null
	photoIds: readonly string[]
}

type ReportLinesProps = {
	lines: readonly ShownLine[]
	/** The address that a photo's id is put behind. */
	photosHref: string
	/** What stands at the right of a line: a field, or what was decided. */
	beside?: (line: ShownLine) => ReactNode
}

/** The lines of a report with what was written and the photos, which open in full. */
export function ReportLines({ lines, photosHref, beside }: ReportLinesProps) {
	return (
		<ol className="report-lines">
			{lines.map((line) => (
				<li key={line.id}>
					<div className="min-w-0">
						<h2>
							<span className="fig text-ink-faint">{line.code}</span> <span className="name">{line.name}</span>
						</h2>
						<p className="note">
							{line.detail}
							{line.lotCodes && `${line.detail ? ", " : ""}lot ${line.lotCodes}`}
						</p>
						<p className="row-line">
							<b>{piecesWords(line.pieces)}</b> reported broken, {photoWords(line.photoIds.length)}
						</p>
						{line.note && <p className="aside">{line.note}</p>}
					</div>
					<div className="report-beside">{beside ? beside(line) : <Decided line={line} />}</div>
					{line.photoIds.length > 0 && (
						<ul className="report-photos">
							{line.photoIds.map((photo, index) => (
								<li key={photo}>
									<a href={`${photosHref}/${photo}`}>
										<img
											src={`${photosHref}/${photo}`}
											alt={`${line.name}, broken, ${index + 1} of ${line.photoIds.length}`}
											loading="lazy"
										/>
									</a>
								</li>
							))}
						</ul>
					)}
				</li>
			))}
		</ol>
	)
}

function Decided({ line }: { line: ShownLine }) {
	if (line.acceptedPieces === null) return <p className="note">no answer yet</p>
	return <p>{line.acceptedPieces === 0 ? "not credited" : `${piecesWords(line.acceptedPieces)} credited`}</p>
}
