import type { Day } from "../calendar"
import type { Result } from "../result"
import { fixedLength, type Identifier, identifierOf, isOfForm } from "./application-identifiers"
import { hasRightCheckDigit } from "./check-digit"
import { readElementDate } from "./element-dates"

/** One fact of a label: an identifier and what follows it. */
export type Element = { ai: string; value: string }

export type ElementRefusal =
	| { ok: false; reason: "unknown-identifier" | "wrong-form" | "wrong-check-digit" | "no-such-day"; ai: string }
	| { ok: false; reason: "not-elements" | "empty" }
	| { ok: false; reason: "missing"; ai: string; needs: string }

/** Ends an element whose length is not told; a scanner gives FNC1 as this character. */
export const SEPARATOR = "\u001D"

const withoutSeparator = (data: string) => (data.startsWith(SEPARATOR) ? data.slice(1) : data)

function faultOf({ ai, value }: Element): ElementRefusal | null {
	const identifier = identifierOf(ai)
	if (!identifier) return { ok: false, reason: "unknown-identifier", ai }
	if (!isOfForm(identifier, value)) return { ok: false, reason: "wrong-form", ai }
	if (/^(?:N14|N18|N13)$/.test(identifier.data) && !hasRightCheckDigit(value)) {
		return { ok: false, reason: "wrong-check-digit", ai }
	}
	// The century is of no account here.
	if (identifier.data.includes("yymmdd") && readElementDate(value, 2000) === null) {
		return { ok: false, reason: "no-such-day", ai }
	}
	return null
}

function check(elements: readonly Element[]): ElementRefusal | null {
	if (elements.length === 0) return { ok: false, reason: "empty" }
	for (const element of elements) {
		const fault = faultOf(element)
		if (fault) return fault
		const needs = identifierOf(element.ai)?.needs
		if (needs && !elements.some(({ ai }) => ai === needs))
			return { ok: false, reason: "missing", ai: element.ai, needs }
	}
	return null
}

/**
 * Elements as the data of a GS1-128 symbol and as the words below it. A separator stands after an element of open length
 * unless it is the last. Refused on an unknown identifier, data of another form, a wrong check digit, a day that is none,
 * or contents without their count. Source: GS1 General Specifications, 7.8.
 */
export function elementString(elements: readonly Element[]): Result<{ data: string; human: string }, ElementRefusal> {
	const fault = check(elements)
	if (fault) return fault
	const data = elements
		.map(({ ai, value }, place) => {
			const isLast = place === elements.length - 1
			return `${ai}${value}${identifierOf(ai)?.isOpenEnded && !isLast ? SEPARATOR : ""}`
		})
		.join("")
	return { ok: true, data, human: elements.map(({ ai, value }) => `(${ai})${value}`).join("") }
}

/** Reads the words below a symbol: "(01)99501101531003(10)C26-041". */
export function readHumanElements(human: string): Result<{ elements: Element[] }, ElementRefusal> {
	if (!/^(?:\(\d{2,4}\)[^(]+)+$/.test(human)) return { ok: false, reason: "not-elements" }
	const elements = [...human.matchAll(/\((\d{2,4})\)([^(]+)/g)].map(([, ai = "", value = ""]) => ({ ai, value }))
	const fault = check(elements)
	return fault ?? { ok: true, elements }
}

function startOf(data: string): { ai: string; identifier: Identifier } | null {
	for (const length of [2, 3, 4]) {
		const ai = data.slice(0, length)
		const identifier = ai.length === length ? identifierOf(ai) : null
		if (identifier) return { ai, identifier }
	}
	return null
}

/** Reads what a scanner gives. */
export function readElementData(scanned: string): Result<{ elements: Element[] }, ElementRefusal> {
	const elements: Element[] = []
	let rest = withoutSeparator(scanned)
	while (rest !== "") {
		const start = startOf(rest)
		if (!start) return { ok: false, reason: "unknown-identifier", ai: rest.slice(0, 4) }
		const after = rest.slice(start.ai.length)
		const length = fixedLength(start.identifier) ?? `${after}${SEPARATOR}`.indexOf(SEPARATOR)
		elements.push({ ai: start.ai, value: after.slice(0, length) })
		rest = withoutSeparator(after.slice(length))
	}
	const fault = check(elements)
	return fault ?? { ok: true, elements }
}

/** What a label says: weight as decimal text with its unit, best before, lot, and count. */
export type LabelFacts = {
	netWeight: { amount: string; unit: "lb" | "kg" } | null
	bestBeforeOn: Day | null
	lot: string | null
	count: number | null
}

function withPoint(digits: string, places: number): string {
	const text = `${Number(digits)}`.padStart(places + 1, "0")
	return places === 0 ? text : `${text.slice(0, -places)}.${text.slice(-places)}`
}

/** The facts in elements that were read without fault. */
export function labelFacts(elements: readonly Element[], thisYear: number): LabelFacts {
	const dataOf = (ai: string) => elements.find((element) => element.ai === ai)?.value ?? null
	const weight = elements.find(({ ai }) => /^3[12]0\d$/.test(ai))
	const bestBefore = dataOf("15")
	const count = dataOf("37") ?? dataOf("30")
	return {
		netWeight: weight
			? { amount: withPoint(weight.value, Number(weight.ai[3])), unit: weight.ai.startsWith("320") ? "lb" : "kg" }
			: null,
		bestBeforeOn: bestBefore && readElementDate(bestBefore, thisYear),
		lot: dataOf("10"),
		count: count === null ? null : Number(count),
	}
}
