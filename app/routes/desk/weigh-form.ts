import { doubtWords, readNetWeight } from "~/domain/pricing/weighed-line"
import type { RefusedWeight, WeighedLine } from "~/services/orders/pack-order.server"
import type { WeighPosted } from "~/ui/desk/weigh-field"

const UUID = "[0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12}"

/** Reads the net weights beside the lines of an order: what was typed, what is wrong with it, and what it means. */
export function readWeights(form: FormData): WeighPosted & { weighed: WeighedLine[] } {
	const values: Record<string, string> = {}
	const errors: Record<string, string> = {}
	const weighed = [...form].flatMap(([name, value]): WeighedLine[] => {
		const lineId = new RegExp(`^weight-(${UUID})$`).exec(name)?.[1]
		if (!lineId || typeof value !== "string") return []
		const typed = value.slice(0, 40)
		values[name] = typed
		const read = readNetWeight(typed)
		if (!read.ok) {
			errors[name] = read.message
			return []
		}
		// The tick stands for one weight: another one is asked about anew.
		return [{ lineId, grams: read.grams, isSure: form.get(`sure-${lineId}`) === String(read.grams) }]
	})
	return { values, errors, sure: {}, weighed }
}

/** The weights that the packing refused, for the sides of their fields, with a tick for each that is only doubted. */
export function weightProblems(
	refused: readonly RefusedWeight[],
	weighed: readonly WeighedLine[],
): Omit<WeighPosted, "values"> {
	const errors: Record<string, string> = {}
	const sure: Record<string, number> = {}
	for (const { lineId, reason, ...line } of refused) {
		const name = `weight-${lineId}`
		const grams = weighed.find((one) => one.lineId === lineId)?.grams
		if (reason === "doubtful" && grams !== undefined) {
			errors[name] = doubtWords(grams, line)
			sure[name] = grams
		} else errors[name] = "Weigh it and write its net weight, such as 9 lb 12 oz or 4423 g."
	}
	return { errors, sure }
}
