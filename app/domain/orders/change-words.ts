/** How one line of an order changed: cases asked before and after, 0 where it came or went. */
export type LineChange = { code: string; name: string; from: number; to: number }

/**
 * What a store changed in an order, for its timeline: "11 Round section, clover from 3 to 4 cases; 41 Cut comb, clover
 * added, 2 cases; 51 Chunk honey, sainfoin taken off." Where no line changed, it was the number or the note.
 */
export function changeWords(changes: readonly LineChange[]): string {
	if (changes.length === 0) return "Its order number or note."
	const parts = changes.map(({ code, name, from, to }) => {
		const cases = to === 1 ? "1 case" : `${to} cases`
		if (to === 0) return `${code} ${name} taken off`
		return from === 0 ? `${code} ${name} added, ${cases}` : `${code} ${name} from ${from} to ${cases}`
	})
	return `${parts.join("; ")}.`
}
