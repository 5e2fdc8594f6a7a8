/** The most hives that one row may have. */
export const LONGEST_ROW = 100

/**
 * The labels of a row of hives: the first as given, then counting up the number it ends with: "A7", "A8". One hive may have any
 * label; null when there are to be more and the label ends in no number of at most six figures.
 */
export function rowOfLabels(first: string, count: number): string[] | null {
	if (count === 1) return [first]
	const [, words = "", number = ""] = /^(.*?)(\d{1,6})$/.exec(first) ?? []
	if (number === "") return null
	return Array.from(
		{ length: count },
		(_, step) => `${words}${String(Number(number) + step).padStart(number.length, "0")}`,
	)
}
