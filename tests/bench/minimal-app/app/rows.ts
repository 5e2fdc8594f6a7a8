const MOST_ROWS = 400

/** Fixed rows, no two alike, so that the framework finds as little to share between them as in real data. */
export const rows = Array.from({ length: MOST_ROWS }, (_, index) => {
	const number = String(index).padStart(4, "0")
	return {
		id: `27b14c97-f132-41a2-83f7-fcc8d022${number}`,
		code: number,
		name: `Product of the bench, ${number}`,
		detail: `Detail of it, ${index} oz`,
		pieces: 6 + index,
		cents: 11_400 + index,
	}
})
