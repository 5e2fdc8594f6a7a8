/**
 * The rows of one comparison, `{ name, unit, ours, reference, ratio, floor? }`: the rate, the median time and the 99th
 * percentile. A ratio above 1 says that ours is better, also where less is better. `floor` is the aim for the rate.
 */
export function rowsOf(name, unit, ours, reference, floor) {
	const more = (of, what) => ({ name, unit: what, ...both(ours[of], reference[of]), ratio: ours[of] / reference[of] })
	const less = (of, what) => ({ name, unit: what, ...both(ours[of], reference[of]), ratio: reference[of] / ours[of] })
	return [
		{ ...more("perSecond", unit), ...(floor && { floor }) },
		less("medianMs", "ms, median"),
		less("p99Ms", "ms, 99th percentile"),
	].map((row) => ({ ...row, ratio: Math.round(row.ratio * 1000) / 1000 }))
}

const both = (ours, reference) => ({ ours: tidy(ours), reference: tidy(reference) })

const tidy = (number) => Number(number.toPrecision(4))

/** The rows as a table for people: a name stands once, above what was measured under it. */
export function tableOf(rows) {
	const head = ["", "ours", "reference", "ratio", "aim"]
	const lines = rows.map((row) => [
		`  ${row.unit}`,
		...[row.ours, row.reference].map(String),
		row.ratio.toFixed(2),
		row.floor ? `${row.floor.toFixed(1)} or more` : "",
	])
	const widths = head.map((_, column) => Math.max(...[head, ...lines].map((line) => line[column].length)))
	const laidOut = (line) =>
		line
			.map((cell, column) => (column === 0 ? cell.padEnd(widths[0]) : cell.padStart(widths[column])))
			.join("   ")
			.trimEnd()
	return [
		laidOut(head),
		...lines.flatMap((line, index) => {
			const { name } = rows[index]
			return name === rows[index - 1]?.name ? [laidOut(line)] : ["", name, laidOut(line)]
		}),
	].join("\n")
}
