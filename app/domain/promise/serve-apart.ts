/** A supply on a line of numbered days: it can serve promises of the days `first` to `last`, both included. */
export type Span = { first: number; last: number; quantity: number }

/**
 * Says for each day how much of the promises of earlier days can be served by supplies that are past their last day by
 * then. `promised` is what is promised on each day. Supplies are taken in the order in which they end, and each serves the
 * earliest promise it can: what it leaves is later, and every supply that ends later reaches that just as well. So each
 * answer is the most that any assignment serves. Takes time in proportion to days and supplies, but for the sorting.
 */
export function servedBefore(spans: readonly Span[], promised: readonly number[]): number[] {
	const unserved = [...promised]
	const nextOpen = openDays(unserved)
	const ending = spans.toSorted((a, b) => a.last - b.last)
	let served = 0
	let position = 0
	return promised.map((_, day) => {
		for (let span = ending[position]; span && span.last < day; span = ending[position]) {
			served += serve(span, unserved, nextOpen)
			position += 1
		}
		return served
	})
}

/** The same with time turned round: how much of the promises of later days the supplies can serve that come after a day. */
export function servedAfter(spans: readonly Span[], promised: readonly number[]): number[] {
	const end = promised.length - 1
	const turned = spans.map(({ first, last, quantity }) => ({ first: end - last, last: end - first, quantity }))
	return servedBefore(turned, promised.toReversed()).toReversed()
}

function serve(span: Span, unserved: number[], nextOpen: (day: number) => number): number {
	let left = span.quantity
	for (let day = nextOpen(span.first); left > 0 && day <= span.last; day = nextOpen(day)) {
		const taken = Math.min(left, unserved[day] as number)
		unserved[day] = (unserved[day] as number) - taken
		left -= taken
	}
	return span.quantity - left
}

/** Finds the first day from a given one on with a promise that is still open; the way there gets shorter as days fill up. */
function openDays(unserved: readonly number[]): (day: number) => number {
	const jump = Array.from({ length: unserved.length + 1 }, (_, day) => day)
	return (from) => {
		let day = from
		while (day < unserved.length && unserved[day] === 0) {
			const further = Math.max(day + 1, jump[day] as number)
			jump[day] = Math.max(further, jump[further] as number)
			day = jump[day] as number
		}
		return day
	}
}
