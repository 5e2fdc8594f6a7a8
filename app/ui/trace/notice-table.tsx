type NoticeRow = {
	id: string
	storeName: string
	phone: string
	pieces: number
	letters: number
	sent: number
	lastError: string
	/** When, in words, or null when it was not. */
	opened: string | null
	answered: string | null
	heldPieces: number | null
	answerNote: string
}

/** One store a line: whether it was written to, has opened the notice, and what it says it still holds. */
export function NoticeTable({ notices }: { notices: readonly NoticeRow[] }) {
	return (
		<table className="sheet-table beside-margin">
			<thead>
				<tr>
					<th scope="col">Store</th>
					<th scope="col" className="max-desk:hidden">
						Letter
					</th>
					<th scope="col">Notice</th>
					<th scope="col" className="num">
						Had
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Still holds
					</th>
				</tr>
			</thead>
			<tbody>
				{notices.map((notice) => (
					<tr key={notice.id}>
						<td>
							{notice.storeName}
							<span className="note block desk:hidden">{letterWords(notice)}</span>
							{notice.answerNote && <span className="note block">{notice.answerNote}</span>}
						</td>
						<td className="max-desk:hidden">
							<span className={notice.letters === 0 || notice.lastError ? "short" : undefined}>
								{letterWords(notice)}
							</span>
						</td>
						<td>{noticeWords(notice)}</td>
						<td className="num fig">{notice.pieces}</td>
						<td className="num fig pr-4! desk:pr-8!">{notice.heldPieces ?? "not known"}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

function letterWords({ letters, sent, lastError, phone }: NoticeRow): string {
	if (letters === 0) return phone ? `call them: ${phone}` : "call them: no phone is noted"
	if (sent > 0) return sent === 1 ? "mailed" : `mailed to ${sent} people`
	return lastError ? `not gone yet: ${lastError}` : "on its way"
}

function noticeWords({ opened, answered }: NoticeRow): string {
	if (answered) return `answered ${answered}`
	return opened ? `opened ${opened}` : "not opened"
}
