import { weighedPriceCents } from "../money"
import type { Result } from "../result"
import { exactlyIn, parseWeight } from "../scale/weight-units"
import { weightWords } from "../weight"

/** A weight that differs by more than this part from what the label says is asked about. Common practice, no source. */
const DOUBTFUL_PERCENT = 15
const MOST_GRAMS = 2_000_000

/** What a line costs: its cases at the price of a case, or what was weighed at the price of a pound. */
type PricedByEither = { cases: number; caseCents: number; poundCents: number | null; weighedGrams: number | null }

/**
 * What a line comes to in cents. Comb priced by weight is an estimate until it is weighed; then its net weight times the
 * price of the pound, rounded once (`weighedPriceCents`). A line of no cases costs nothing.
 */
export function lineAmount(line: PricedByEither): { cents: number; isEstimate: boolean } {
	const { cases, caseCents, poundCents, weighedGrams } = line
	if (cases === 0) return { cents: 0, isEstimate: false }
	if (poundCents === null) return { cents: cases * caseCents, isEstimate: false }
	if (weighedGrams === null) return { cents: cases * caseCents, isEstimate: true }
	return { cents: weighedPriceCents(weighedGrams, "g", poundCents), isEstimate: false }
}

/**
 * Reads the net weight of a line as typed: "9 lb 12 oz", "9.75 lb", "156 oz", "4423 g". Answers whole grams; a part of a
 * gram is dropped, so that a store never pays for more than was weighed. The unit is never guessed. `message` is one
 * sentence for the side of the field.
 */
export function readNetWeight(
	typed: string,
): Result<{ grams: number }, { ok: false; reason: string; message: string }> {
	const refuse = (reason: string, message: string) => ({ ok: false as const, reason, message })
	if (typed.trim() === "") return refuse("empty", "Weigh it and write its net weight, such as 9 lb 12 oz or 4423 g.")
	const read = parseWeight(typed, "g")
	if (!read.ok) return refuse("not-a-weight", "Write a weight, such as 9 lb 12 oz or 4423 g.")
	if (!/[a-z]/i.test(typed)) return refuse("no-unit", "Write the unit behind it: lb, oz or g.")
	const { top, bottom } = exactlyIn(read.weight, "g")
	const grams = Number(top / bottom)
	if (top <= 0n || grams < 1) return refuse("nothing", "Comb that is packed weighs something. Weigh it again.")
	if (grams > MOST_GRAMS) return refuse("too-much", "That is more than two tons. Check the unit.")
	return { ok: true, grams }
}

/** Whether a net weight is so far from what these pieces weigh by their label that it must be confirmed. */
export function isWeightDoubtful(grams: number, line: { pieces: number; pieceNetGrams: number }): boolean {
	const usual = line.pieces * line.pieceNetGrams
	return Math.abs(grams - usual) * 100 > usual * DOUBTFUL_PERCENT
}

/** Why a weight is asked about: "2 lb is 78 % less than 12 pieces usually weigh, 9 lb. Weigh it again, or …". */
export function doubtWords(grams: number, line: { pieces: number; pieceNetGrams: number }): string {
	const usual = line.pieces * line.pieceNetGrams
	const percent = Math.round((Math.abs(grams - usual) * 100) / usual)
	const side = grams < usual ? "less" : "more"
	const pieces = line.pieces === 1 ? "1 piece" : `${line.pieces} pieces`
	return `${weightWords(grams)} is ${percent} % ${side} than ${pieces} usually weigh, ${weightWords(usual)}. Weigh again, or say that it is right.`
}
