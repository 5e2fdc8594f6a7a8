/** The middle of the milliseconds that `work` takes, over `times` runs after two to warm up. */
export function medianOf(times: number, work: () => unknown): number {
	const taken = Array.from({ length: times + 2 }, () => {
		const began = performance.now()
		work()
		return performance.now() - began
	})
	return middle(taken.slice(2))
}

/** The same for work that waits. */
export async function medianOfAsync(times: number, work: () => Promise<unknown>): Promise<number> {
	const taken: number[] = []
	for (let run = 0; run < times + 2; run += 1) {
		const began = performance.now()
		await work()
		taken.push(performance.now() - began)
	}
	return middle(taken.slice(2))
}

function middle(numbers: readonly number[]): number {
	return numbers.toSorted((a, b) => a - b)[Math.floor(numbers.length / 2)] ?? Number.NaN
}
