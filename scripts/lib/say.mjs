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

/** Prints what ended the script: the sentence of a Refusal, or the whole error of anything that was not foreseen. */
export function explain(error) {
	console.error(error instanceof Refusal ? error.message : error)
}
