import { decimalText, exactly } from "./fraction"
import type { NetContentsRefusal, NetContentsWorksheet } from "./net-contents"
import type { WeightsRefusal } from "./parse-weights"
import type { WeightDoubt } from "./unit-doubt"
import type { WeightUnit } from "./weight-units"

/** Decimals that are worth showing: a hundredth of a gram, as fine in ounces and pounds. */
const PLACES: Record<WeightUnit, number> = { g: 3, oz: 4, lb: 5 }

const UNIT_WORDS: Record<WeightUnit, string> = { g: "grams", oz: "ounces", lb: "pounds" }

const unitWords = (unit: WeightUnit) => UNIT_WORDS[unit]

/** A figure of a worksheet as it is read: rounded for the eye, with a true minus sign: "−1.861". */
export function shownFigure(figure: string, unit: WeightUnit): string {
	const text = decimalText(exactly(figure), PLACES[unit]).replace(/\.?0+$/, "")
	return text.replace("-", "−")
}

/** "16.3 g". */
export const shownWeight = (figure: string, unit: WeightUnit) => `${shownFigure(figure, unit)} ${unit}`

const short = (figure: string, unit: WeightUnit) => shownWeight(figure.replace("-", ""), unit)

function averageWords(sheet: NetContentsWorksheet): string {
	const { average, limit, unit } = sheet
	if (!average.startsWith("-") || average === "0") {
		return average === "0"
			? "on average its packages hold what the label says"
			: `on average its packages hold ${short(average, unit)} more than the label says`
	}
	const off = `on average its packages are ${short(average, unit)} short`
	if (limit === null) return off
	if (sheet.isAverageAtLimit) return `${off}, exactly the sample error limit, which is taken as a pass`
	return `${off}, ${sheet.isAverageMet ? "within" : "more than"} the sample error limit of ${short(limit, unit)}`
}

function variationWords({ tooShort, plan, variation, unit }: NetContentsWorksheet): string {
	const limit = `the maximum allowable variation of ${short(variation, unit)}`
	if (tooShort === 0) return `no package is short by more than ${limit}`
	const packages = tooShort === 1 ? "one package is" : `${tooShort} packages are`
	return `${packages} short by more than ${limit}; ${plan.shortAllowed === 0 ? "none" : plan.shortAllowed} may be`
}

/** The decision in one sentence, the reason that counts first. */
export function decisionSentence(sheet: NetContentsWorksheet): string {
	const [average, variation] = [averageWords(sheet), variationWords(sheet)]
	if (sheet.hasPassed) return `The lot passes: ${sheet.isAverageAsked ? `${average}, and ${variation}` : variation}.`
	if (sheet.isAverageMet) return `The lot fails: ${variation}.`
	return sheet.isVariationMet ? `The lot fails: ${average}.` : `The lot fails: ${average}, and ${variation}.`
}

/** "Package 3", "Packages 3, 7". */
function packagesWords(places: readonly number[]): string {
	return `${places.length === 1 ? "Package" : "Packages"} ${places.map((place) => place + 1).join(", ")}`
}

const verb = (places: readonly number[], one: string, several: string) => (places.length === 1 ? one : several)

/** Why a check could not be made, and what to do. */
export function refusalWords(refusal: NetContentsRefusal): string {
	switch (refusal.reason) {
		case "no-label":
			return "Write what the label declares, in ounces, in grams or in both."
		case "over-the-table":
			return "The table of variations at hand ends at 5.80 lb (2,630 g). Ask your weights-and-measures office for heavier packages."
		case "no-packages":
			return "Write how many packages are in the lot, 1 or more."
		case "sample-size":
			return `The plan asks for ${refusal.needed} weights and there are ${refusal.given}. Weigh ${
				refusal.given < refusal.needed ? `${refusal.needed - refusal.given} more` : "those drawn first only"
			}.`
		case "too-few-tares":
			return `Weigh at least ${refusal.needed} empty packages; there ${refusal.given === 1 ? "is one" : `are ${refusal.given}`}.`
		case "tare-too-heavy":
			return `${packagesWords(refusal.places)} ${verb(refusal.places, "weighs", "weigh")} no more than the empty package. Look at the tare and at the unit.`
		case "not-a-weight":
			return `${packagesWords(refusal.places)} ${verb(refusal.places, "weighs", "weigh")} nothing. Write the full weight.`
	}
}

/** Why weights could not be read, and what to do. */
export function weightsRefusalWords(refusal: WeightsRefusal): string {
	switch (refusal.reason) {
		case "empty":
			return "There is no weight here. Write the full weights, one for each package."
		case "too-many":
			return "There are more than 1,000 weights. Send those of the sample only."
		case "comma-in-doubt":
			return "A comma could be between two weights or before decimals. Put each weight on a line of its own."
		case "several-columns":
			return `There are ${refusal.columns} columns of figures. Name the one with full weights “gross”, or leave the others out.`
		case "not-a-weight": {
			const [first = ""] = refusal.cells
			const named = first.length > 30 ? `${first.slice(0, 30)}…` : first
			const others = refusal.cells.length - 1
			const more = others === 0 ? "" : others === 1 ? ", nor is another" : `, nor are ${others} others`
			return `“${named}” is no weight${more}. Write figures, such as 368 or 12.5 oz.`
		}
	}
}

/** What looks wrong, as a question. */
export function doubtWords(doubt: NonNullable<WeightDoubt>, unit: WeightUnit): string {
	if (doubt.kind === "packages") {
		return `${packagesWords(doubt.places)} ${verb(doubt.places, "is", "are")} far from what the label says. Mend the weight, or say below that it is right.`
	}
	const times = doubt.times > 1 ? doubt.times : 1 / doubt.times
	const off = `about ${times >= 10 ? Math.round(times) : times.toFixed(1)} times ${doubt.times > 1 ? "more" : "less"}`
	return `All weights are ${off} than the label says. Were they weighed in ${unitWords(doubt.likely)}? Change the unit, or say below that they are in ${unitWords(unit)}.`
}
