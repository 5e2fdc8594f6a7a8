import { refuse } from "./say.mjs"

/**
 * Waits until `url` answers 200 (with `anyAnswer`, until it answers at all); refuses when it has not after `seconds`, or at
 * once when `member` has ended.
 */
export async function untilItAnswers(url, member, { seconds = 60, anyAnswer = false } = {}) {
	const deadline = Date.now() + seconds * 1000
	let last = "no answer"
	while (Date.now() < deadline && !member.over) {
		try {
			const response = await fetch(url, { signal: AbortSignal.timeout(5000) })
			if (anyAnswer || response.status === 200) return
			last = `${response.status} ${(await response.text()).slice(0, 300)}`
		} catch (error) {
			last = error.cause?.message ?? error.message
		}
		await new Promise((resolve) => setTimeout(resolve, 100))
	}
	// The end of a member is reported with its log by the crew, whose promise has settled before this one.
	refuse(
		member.over ? `The ${member.name} ended.` : `The ${member.name} is not ready after ${seconds} seconds: ${last}`,
	)
}
