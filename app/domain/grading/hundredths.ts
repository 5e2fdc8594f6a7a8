/** A figure in hundredths as it is written: 1250 is "12.5", 8500 is "85". */
export function formatHundredths(hundredths: number): string {
	return String(hundredths / 100)
}

/**
 * Reads a figure of up to four digits and two places as whole hundredths: "12.5" is 1250. Null when it is anything else;
 * a comma is not guessed to be a point.
 */
export function parseHundredths(text: string): number | null {
	const [, whole, part = ""] = /^(\d{1,4})(?:\.(\d{1,2}))?$/.exec(text.trim()) ?? []
	return whole === undefined ? null : Number(whole) * 100 + Number(part.padEnd(2, "0"))
}
