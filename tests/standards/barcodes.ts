import { describe, expect, test } from "vitest"
import { identifierOf, identifiers } from "~/domain/barcodes/application-identifiers"
import { checkDigit, hasRightCheckDigit } from "~/domain/barcodes/check-digit"
import { elementDate } from "~/domain/barcodes/element-dates"
import {
	type Element,
	elementString,
	labelFacts,
	readElementData,
	readHumanElements,
	SEPARATOR,
} from "~/domain/barcodes/element-strings"
import { priceCheckDigit, priceWeights } from "~/domain/barcodes/price-check-digit"
import { readRestrictedUpc, restrictedUpc } from "~/domain/barcodes/restricted-upc"
import { fullDay } from "~/domain/calendar"
import type { PublishedValues } from "./published-values"
import type { Entry } from "./scale-shapes"

/** How a file writes the separator that has no sign of its own. */
const WRITTEN_SEPARATORS = /<(?:GS|FNC1)>|\{(?:GS|FNC1)\}|\[(?:GS|FNC1)\]|~1|␝|\^/g

function holdCheckDigits(examples: readonly Entry[]): void {
	if (examples.length === 0) return
	test.each(examples)("check digit of $body is $check", ({ body, check, full }) => {
		expect(checkDigit(`${body}`)).toBe(Number(check))
		const code = `${full ?? `${body}${check}`}`
		expect(code).toBe(`${body}${checkDigit(`${body}`)}`)
		expect(hasRightCheckDigit(code)).toBe(true)
		expect(hasRightCheckDigit(`${body}${(Number(check) + 1) % 10}`)).toBe(false)
	})
}

function holdPriceTables(tables: Entry): void {
	const found = Object.entries(priceWeights).filter(([name]) => Array.isArray(tables[name]))
	if (found.length === 0) return
	test.each(found)("digits of a price weighed by %s", (name, weigh) => {
		expect([0, 1, 2, 3, 4, 5, 6, 7, 8, 9].map(weigh)).toEqual(tables[name])
	})
}

function holdRestricted(section: Entry): void {
	const lists = Object.values(section).flatMap((value) => (Array.isArray(value) ? (value as Entry[]) : []))
	const single = section.example ? [section.example as Entry] : []
	const examples = [...single, ...lists].filter((entry) => entry.item !== undefined && entry.code !== undefined)
	if (examples.length === 0) return
	test.each(examples)("item $item at $price is coded $code", ({ item, price, code }) => {
		expect(restrictedUpc(`${item}`, Number(price))).toBe(code)
		expect(readRestrictedUpc(`${code}`)).toEqual({ item, priceCents: Number(price) })
	})
}

function holdIdentifiers(ais: readonly Entry[]): void {
	const known = ais.filter(({ ai }) => identifiers.some((each) => each.ai === ai))
	const unknown = ais.filter((entry) => !known.includes(entry)).map(({ ai }) => ai)
	if (unknown.length > 0) console.info(`No rule yet for part of barcodes.ais: ${unknown.join(", ")}`)
	if (known.length === 0) return
	test.each(known)("identifier ($ai) $title", (entry) => {
		const found = identifiers.find(({ ai }) => ai === entry.ai)
		expect({ data: found?.data, title: found?.title, fnc1: found?.isOpenEnded }).toEqual({
			data: entry.data,
			title: entry.title,
			fnc1: entry.fnc1,
		})
		expect(found?.needs).toBe(entry.needs)
		expect(identifierOf(`${entry.ai}`.replace("n", "2"))).toBe(found)
	})
}

/** What a meaning in words must say of the facts that were read: weight, day, lot, count. */
function expectMeaning(elements: readonly Element[], meaning: string): void {
	const facts = labelFacts(elements, 2026)
	const { netWeight, bestBeforeOn, lot, count } = facts
	const [, amount, unit] = /([\d.]+) (lb|kg)\b/.exec(meaning) ?? []
	if (amount)
		expect(netWeight && { amount: Number(netWeight.amount), unit: netWeight.unit }).toEqual({
			amount: Number(amount),
			unit,
		})
	const [, day, month, year] = /(\d{1,2}) ([A-Z][a-z]{2})[a-z]* (\d{4})/.exec(meaning) ?? []
	if (day && month && /best before/i.test(meaning)) {
		expect(bestBeforeOn && fullDay(bestBeforeOn)).toMatch(new RegExp(`${month}[a-z]* ${Number(day)}, ${year}`))
	}
	const [, code] = /\blot ([\w/-]+)/i.exec(meaning) ?? []
	if (code) expect(lot).toBe(code)
	const [, pieces] = /\b(?:count|quantity) (\d+)|(\d+) (?:pieces|units)\b/i.exec(meaning)?.filter(Boolean) ?? []
	if (pieces) expect(count).toBe(Number(pieces))
}

function holdElements(strings: readonly Entry[]): void {
	if (strings.length === 0) return
	test.each(strings)("$human", ({ human, data, meaning }) => {
		const scanned = `${data}`.replace(WRITTEN_SEPARATORS, SEPARATOR)
		const read = readHumanElements(`${human}`)
		if (!read.ok) throw new Error(`not read: ${read.reason}`)
		expect(elementString(read.elements)).toEqual({ ok: true, data: scanned, human })
		expect(readElementData(scanned)).toEqual(read)
		if (meaning) expectMeaning(read.elements, `${meaning}`)
	})
	test.each(strings)("a wrong last digit of the item of $human is noticed", ({ human }) => {
		const wrong = `${human}`.replace(
			/^\((0[012])\)(\d+)(\d)/,
			(_, ai, body, digit) => `(${ai})${body}${(Number(digit) + 1) % 10}`,
		)
		if (wrong === human) return expect(human).not.toMatch(/^\(0[012]\)/)
		expect(readHumanElements(wrong)).toMatchObject({ ok: false, reason: "wrong-check-digit" })
	})
}

/** Makes tests of check digits, prices inside codes, identifiers and whole element strings. */
export function holdBarcodes({ barcodes: topic }: PublishedValues): void {
	if (!topic) return
	describe("codes", () => {
		if (topic.check_digit) {
			test("the check digit lifts the weighed sum to the next ten", () => {
				for (const body of ["0", "5", "12", "629104150021"]) {
					const digits = [...`${body}${checkDigit(body)}`].reverse().map(Number)
					const sum = digits.reduce((total, digit, place) => total + digit * (place % 2 === 0 ? 1 : 3), 0)
					expect(sum % 10).toBe(0)
				}
			})
			test("a day is written as six digits", () => expect(elementDate("2026-11-30")).toBe("261130"))
		}
		holdCheckDigits(topic.check_digit_examples ?? [])
		holdPriceTables(topic.price_digit_tables ?? {})
		const prices = topic.price_digit_examples ?? []
		if (prices.length > 0) {
			test.each(prices)("the price $price is guarded by $digit", ({ price, digit }) => {
				expect(priceCheckDigit(`${price}`)).toBe(digit)
			})
		}
		holdRestricted(topic.restricted_upc ?? {})
		holdIdentifiers(topic.ais ?? [])
		holdElements(topic.element_strings ?? [])
	})
}
