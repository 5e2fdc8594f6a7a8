import { casesWords } from "~/domain/quantity"

const SMALL = [
	"none",
	"one",
	"two",
	"three",
	"four",
	"five",
	"six",
	"seven",
	"eight",
	"nine",
	"ten",
	"eleven",
	"twelve",
] as const

/** A count inside a sentence: "two", "14". */
export function countWords(count: number): string {
	return SMALL[count] ?? String(count)
}

/** A count at the head of a sentence: "Two", "14". */
export function countHead(count: number): string {
	const words = countWords(count)
	return words.charAt(0).toUpperCase() + words.slice(1)
}

/** A count with its noun: "one order", "three orders". */
export function counted(count: number, one: string, many = `${one}s`): string {
	return `${countWords(count)} ${count === 1 ? one : many}`
}

/** Pieces as cases where they come out even: "3 cases", "2 cases and 5 pieces", "7 pieces". */
export function caseAndPieceWords(pieces: number, piecesPerCase: number): string {
	const cases = Math.floor(pieces / piecesPerCase)
	const rest = pieces - cases * piecesPerCase
	const restWords = rest === 1 ? "1 piece" : `${rest} pieces`
	if (rest === 0) return casesWords(cases)
	return cases === 0 ? restWords : `${casesWords(cases)} and ${restWords}`
}
