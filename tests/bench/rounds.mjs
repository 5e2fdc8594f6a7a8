/** The middle of some numbers. */
function median(numbers) {
	const sorted = numbers.toSorted((a, b) => a - b)
	const middle = sorted.length / 2
	return sorted.length % 2 === 0 ? (sorted[middle - 1] + sorted[middle]) / 2 : sorted[Math.floor(middle)]
}

/**
 * Measures `targets` (name → function that is given seconds and answers figures) in turn, so that whatever else the
 * machine does meanwhile meets them all alike: once to warm up, then `rounds` times. Answers for each name the median
 * of each figure over the rounds.
 */
export async function inTurns(targets, { rounds, seconds, warmUpSeconds }) {
	for (const measure of Object.values(targets)) await measure(warmUpSeconds)
	const measured = Object.fromEntries(Object.keys(targets).map((name) => [name, []]))
	for (let round = 0; round < rounds; round += 1) {
		for (const [name, measure] of Object.entries(targets)) measured[name].push(await measure(seconds))
	}
	return Object.fromEntries(Object.entries(measured).map(([name, figures]) => [name, medians(figures)]))
}

function medians(figures) {
	const keys = Object.keys(figures[0])
	return Object.fromEntries(keys.map((key) => [key, median(figures.map((one) => one[key]))]))
}
