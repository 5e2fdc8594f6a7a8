/** A refusal that a person can act on: its message is one plain sentence, printed without a stack. */
export class Refusal extends Error {}

/** Prints one line of progress or of the answer. */
export function say(line = "") {
	console.log(line)
}

/** Ends what is going on with one plain sentence; the script that called prints it and exits with 1. */
export function refuse(sentence) {
	throw new Refusal(sentence)
}

/**
 * Prints what ended the script: the sentence of a Refusal, the faults of an environment that is not complete, or the
 * whole error of anything that was not foreseen.
 */
export function explain(error) {
	const isForeseen = error instanceof Refusal || error?.name === "EnvironmentError"
	console.error(isForeseen ? error.message : error)
}
