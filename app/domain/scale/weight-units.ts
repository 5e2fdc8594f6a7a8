import type { Result } from "../result"
import { exactly, type Fraction, fraction, over, plus, times, toFigures, ZERO } from "./fraction"

/** What a scale shows. */
export const weightUnits = ["g", "oz", "lb"] as const
export type WeightUnit = (typeof weightUnits)[number]

/** A weight as it is declared or was read. */
export type Weight = { amount: Fraction; unit: WeightUnit }

/** Grams in one unit, exactly: the international pound is 453.59237 g. */
const GRAMS: Record<WeightUnit, Fraction> = {
	g: fraction(1n),
	oz: over(exactly("453.59237"), fraction(16n)),
	lb: exactly("453.59237"),
}

const FIGURES = 6

/** The same weight in another unit, exactly. */
export function exactlyIn(weight: Weight, unit: WeightUnit): Fraction {
	return over(times(weight.amount, GRAMS[weight.unit]), GRAMS[unit])
}

/**
 * The same weight in another unit, to six figures where pounds or ounces become grams or the other way; ounces and pounds
 * convert exactly. 1 lb is 453.592 g, 12 oz 340.194 g. Source: NIST Handbook 133 (2026), 2.3.3.1.
 */
export function weightIn(weight: Weight, unit: WeightUnit): Fraction {
	const amount = exactlyIn(weight, unit)
	return (weight.unit === "g") === (unit === "g") ? amount : toFigures(amount, FIGURES)
}

/** A unit as people write it, or null. */
function unitOf(word: string): WeightUnit | "kg" | null {
	if (/^(?:g|gr|grams?|grammes?)$/i.test(word)) return "g"
	if (/^(?:oz|ounces?)$/i.test(word)) return "oz"
	if (/^(?:lbs?|pounds?)$/i.test(word)) return "lb"
	return /^kg$/i.test(word) ? "kg" : null
}

const VULGAR: Record<string, string> = { "¼": " 1/4", "½": " 1/2", "¾": " 3/4", "⅛": " 1/8" }

/** "12", "12.5", "12,5", "7/16", "1 1/8" as a number, or null. */
function amountOf(text: string): Fraction | null {
	const [, whole = "0", above, below] = /^(?:(\d{1,6})\s+)?(\d{1,4})\s*\/\s*(\d{1,4})$/.exec(text) ?? []
	if (above && below) return Number(below) === 0 ? null : plus(exactly(whole), over(exactly(above), exactly(below)))
	return /^[+-]?(?:\d{1,7}(?:[.,]\d{0,6})?|[.,]\d{1,6})$/.test(text) ? exactly(text.replace(",", ".")) : null
}

const PART = /([+-]?[\d.,/\s]*\d[.,]?)\s*([a-z]*)\.?\s*/giy

/**
 * Reads one weight with or without its unit: "368", "0.812 lb", "12,5 oz", "1 lb 2.5 oz", "7/16 oz". Without a unit it is
 * in `unit`; with one it is given in it. Refused when it is no weight.
 */
export function parseWeight(typed: string, unit: WeightUnit): Result<{ weight: Weight }> {
	const text = typed
		.trim()
		.replace(/[−–]/g, "-")
		.replace(/[¼½¾⅛]/g, (sign) => VULGAR[sign] ?? sign)
	const refused = { ok: false as const, reason: "not-a-weight" }
	const parts: Weight[] = []
	PART.lastIndex = 0
	let end = 0
	for (let part = PART.exec(text); part && part[0] !== ""; part = PART.exec(text)) {
		const named = part[2] ? unitOf(part[2]) : unit
		const amount = amountOf(part[1]?.trim() ?? "")
		if (!named || !amount) return refused
		parts.push(named === "kg" ? { amount: times(amount, fraction(1000n)), unit: "g" } : { amount, unit: named })
		end = PART.lastIndex
		if (end === text.length) break
	}
	const [first] = parts
	if (!first || end !== text.length) return refused
	if (parts.length === 1) return { ok: true, weight: first }
	const isPoundsAndOunces = parts.length === 2 && first.unit === "lb" && parts[1]?.unit === "oz"
	if (!isPoundsAndOunces) return refused
	return { ok: true, weight: { amount: parts.map((part) => exactlyIn(part, "lb")).reduce(plus, ZERO), unit: "lb" } }
}
