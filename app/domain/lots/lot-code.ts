import { addDays, type Day, daysBetween } from "~/domain/calendar"
import type { Result } from "~/domain/result"

/** The most characters of a batch or lot number. Source: GS1 General Specifications, application identifier 10. */
const MOST_CHARACTERS = 20

/**
 * Characters that a lot code may hold: those of GS1's set for application identifier 10 that also stand unchanged in the
 * address of a page.
 */
const OUTSIDE = /[^A-Za-z0-9._-]/

const TOKEN = /\{([^{}]*)\}/g
const KNOWN = /^(product|yy|yyyy|ddd|n{1,6})$/

/** Digits that a counter can reach, so that no code of the year becomes too long. */
const COUNTER_DIGITS = 4

export type LotCodeFacts = { productCode: string; harvestedOn: Day; number: number }

/** The lot code by the producer's pattern. The pattern has been read with `readLotCodePattern`. */
export function lotCode(pattern: string, { productCode, harvestedOn, number }: LotCodeFacts): string {
	return pattern.replace(TOKEN, (_, token: string) => {
		if (token === "product") return productCode
		if (token === "yyyy") return harvestedOn.slice(0, 4)
		if (token === "yy") return harvestedOn.slice(2, 4)
		if (token === "ddd") return String(dayOfYear(harvestedOn)).padStart(3, "0")
		return String(number).padStart(token.length, "0")
	})
}

/** The day of the year, January 1 being 1. */
function dayOfYear(day: Day): number {
	return daysBetween(addDays(`${day.slice(0, 4)}-01-01`, -1), day)
}

type CodeRefusal = { ok: false; reason: string; message: string }
const refuse = (reason: string, message: string): CodeRefusal => ({ ok: false, reason, message })

/**
 * Reads a pattern for lot codes: plain characters and {product}, {yy} or {yyyy}, {ddd} for the day of the year, and {n},
 * {nn}, {nnn} … for the lot's number in the year. Refuses, in a sentence, a token it does not know, a pattern that gives
 * two lots the same code (it needs a year and a number, since numbers begin again each year), a code over 20 characters
 * with the longest product code, and characters outside letters, digits, point, hyphen and underscore.
 */
export function readLotCodePattern(
	typed: string,
	{ longestProductCode }: { longestProductCode: string },
): Result<{ pattern: string }, CodeRefusal> {
	const pattern = typed.trim()
	const tokens = [...pattern.matchAll(TOKEN)].map(([, token = ""]) => token)
	const unknown = tokens.find((token) => !KNOWN.test(token))
	if (unknown !== undefined) return refuse("unknown-token", `There is no {${unknown}} for lot codes.`)
	const counters = tokens.filter((token) => token.startsWith("n"))
	if (!tokens.some((token) => token.startsWith("yy")) || counters.length !== 1) {
		return refuse("not-unique", "Put a year, {yy}, and a number, {nnn}, in it once, so that no two lots get one code.")
	}
	if (isNumberRunningOn(pattern)) {
		return refuse(
			"not-unique",
			"Put a hyphen between the number and figures beside it, so that no two lots get one code.",
		)
	}
	const longest = lotCode(pattern, {
		productCode: longestProductCode,
		harvestedOn: "2026-12-31",
		number: 10 ** COUNTER_DIGITS - 1,
	})
	const checked = readLotCode(longest)
	return checked.ok ? { ok: true, pattern } : checked
}

/** Whether figures stand next to the counter: then 1 followed by 12 and 11 followed by 2 are the same. */
function isNumberRunningOn(pattern: string): boolean {
	return /\{n+\}(\d|\{(yy|yyyy|ddd|product)\})|(\d|\{(yy|yyyy|ddd|product)\})\{n+\}/.test(pattern)
}

/** Reads a lot code as typed. Refuses, in a sentence, an empty one, one over 20 characters, and other characters. */
export function readLotCode(typed: string): Result<{ code: string }, CodeRefusal> {
	const code = typed.trim()
	const [odd] = OUTSIDE.exec(code) ?? []
	if (code === "" || /^\.+$/.test(code)) return refuse("empty", "Write a lot code of letters and digits.")
	if (odd) return refuse("characters", `A lot code takes letters, digits, point, hyphen and underscore, not “${odd}”.`)
	if (code.length > MOST_CHARACTERS) {
		return refuse("too-long", `A lot code takes at most ${MOST_CHARACTERS} characters; “${code}” has ${code.length}.`)
	}
	return { ok: true, code }
}
