import { addDays, type Day } from "~/domain/calendar"

/** What a closing kept of things that may still change or come late: the state of each by its id. */
export type NotedStates = { until: Day; states: Readonly<Record<string, string>> }

/** A change of state and the day on which it is entered. */
type BookedStep<State extends string> = { on: Day; from: State | null; to: State }

/**
 * On which days the states of a thing are entered, when it is dated `on` and only its present state is known. A state that
 * no closing had to hold is entered on that day. Once a closing has noted a state, that entry stays; what changed
 * afterwards, or came to be known only then, is entered on the first day that was still open. So no closed day ever gains,
 * loses or changes an entry. `closings` stand in order, the earliest first. This product's own rule; that what was
 * forgotten is entered in the open period is common practice, no source.
 */
export function bookedSteps<State extends string>(
	thing: { id: string; on: Day; state: State },
	closings: readonly NotedStates[],
): BookedStep<State>[] {
	const steps: BookedStep<State>[] = []
	let last: State | null = null
	let firstOpen: Day | null = null
	const step = (to: State) => {
		if (to === last) return
		steps.push({ on: firstOpen && firstOpen > thing.on ? firstOpen : thing.on, from: last, to })
		last = to
	}
	for (const { until, states } of closings) {
		const noted = states[thing.id] as State | undefined
		if (noted) step(noted)
		firstOpen = addDays(until, 1)
	}
	step(thing.state)
	return steps
}
