/** The one place that asks what time it is; rules below are given the answer. */
export function now(): Date {
	return new Date()
}
