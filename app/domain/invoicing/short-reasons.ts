type ShortLine = { askedCases: number; sentCases: number }

/**
 * Why each line is short, in the order of the lines, null where it is not or nobody said why. A note has one sentence to a
 * short line, in their order, a line of the note for each; one that was written as a whole stands for all of them.
 */
export function shortReasons(note: string, lines: readonly ShortLine[]): (string | null)[] {
	if (note === "") return lines.map(() => null)
	const sentences = note.split("\n")
	const isOneToALine = sentences.length === lines.filter(isShort).length
	let next = 0
	return lines.map((line) => {
		if (!isShort(line)) return null
		const own = sentences[next]
		next += 1
		return (isOneToALine ? own : sentences.join(" ")) || null
	})
}

/** One note for the lines of several orders, from the note that each of them had. */
export function joinShortNotes(orders: readonly { note: string; lines: readonly ShortLine[] }[]): string {
	const reasons = orders.flatMap(({ note, lines }) => {
		const ofLines = shortReasons(note, lines)
		return lines.flatMap((line, index) => (isShort(line) ? [ofLines[index] ?? ""] : []))
	})
	return reasons.every((reason) => reason === "") ? "" : reasons.join("\n")
}

function isShort({ askedCases, sentCases }: ShortLine): boolean {
	return sentCases < askedCases
}
