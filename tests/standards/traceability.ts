import { describe, expect, test } from "vitest"
import { addDays } from "~/domain/calendar"
import {
	DIRECT_SALES,
	HONEY_ON_TRACEABILITY_LIST,
	isRetailFoodEstablishment,
	needsRecipientRecord,
	RECEIVED_FIELDS,
	RELEASED_FIELDS,
} from "~/domain/trace/record-fields"
import { AT_HAND_WITHIN_HOURS, keepMonths } from "~/domain/trace/retention"
import type { PublishedValues } from "./published-values"

/** Words by which the regulation names a thing to record. */
const NAMED =
	/firm name|address|telephone|e-mail|type of food|brand|specific variety|date (?:received|released)|lot or code number|quantity|how packaged|carrier|previous source|next recipient|ingredient source|finished lot/g

/** "same contact details" stands for the four that are named for the other firm. */
const CONTACT = ["firm name", "address", "telephone", "e-mail"]

/** What one sentence of the regulation asks to be written down, each with the firm it is about. */
function asked(sentence: string): string[] {
	const whose = /previous source|next recipient|carrier/.exec(sentence)?.[0] ?? ""
	const words = [...sentence.matchAll(NAMED)].map(([word]) => word)
	const named = sentence.includes("same contact details") ? [...CONTACT, ...words] : words
	return named.map((word) => (CONTACT.includes(word) ? `${word} of the ${whose}` : word))
}

function holdFields(title: string, sentences: readonly string[], fields: readonly { holds: string }[]): void {
	describe(title, () => {
		test.each(sentences)("%s", (sentence) => {
			const wanted = asked(sentence)
			expect(wanted.length, "nothing in this sentence is known").toBeGreaterThan(0)
			for (const want of wanted) expect(fields.map(({ holds }) => holds).join("; ")).toContain(want)
		})
	})
}

const HARVESTED = "2026-01-31"

/** Days to the loss of value that a published phrase speaks of: those just within it, and just beyond where it says so. */
const SPOILING: Record<string, readonly number[]> = {
	"within 60 days": [0, 1, 60],
	// Six months from January 31 are over on July 31, 181 days later.
	"after 60 days but within 6 months": [61, 181],
	"not before 6 months (honey)": [182, 300, 900],
}

const monthsOf = (keep: string) => Number.parseInt(keep, 10) * (/year/.test(keep) ? 12 : 1)

/** Makes one test of each line of the record, each period of keeping, and of who counts as selling to consumers. */
export function holdTraceability({ traceability }: PublishedValues): void {
	if (traceability?.receive_1_337)
		holdFields("a record of food received holds", traceability.receive_1_337, RECEIVED_FIELDS)
	if (traceability?.release_1_345)
		holdFields("a record of food released holds", traceability.release_1_345, RELEASED_FIELDS)

	const periods = traceability?.retention_1_360 ?? []
	if (periods.length > 0) {
		describe("a record is kept", () => {
			test.each(periods)("$keep where food spoils or loses value $spoils_or_loses_value", (period) => {
				const days = SPOILING[period.spoils_or_loses_value]
				if (!days) throw new Error(`no days are known for "${period.spoils_or_loses_value}"`)
				for (const count of days) expect(keepMonths(HARVESTED, addDays(HARVESTED, count))).toBe(monthsOf(period.keep))
			})
		})
	}

	const available = traceability?.availability_1_361
	if (available) {
		test(`records are at hand ${available}`, () => {
			expect(AT_HAND_WITHIN_HOURS).toBe(Number(/(\d+) hours/.exec(available)?.[1]))
		})
	}

	const excluded = traceability?.exclusions_1_327
	if (excluded?.direct_to_consumer_sales) {
		test(`sales straight to consumers: ${excluded.direct_to_consumer_sales}`, () => {
			expect(needsRecipientRecord("consumer")).toBe(
				!/no 1\.345 recipient record/.test(excluded.direct_to_consumer_sales ?? ""),
			)
			expect(needsRecipientRecord("store")).toBe(true)
		})
	}

	const retail = traceability?.retail_food_establishment
	if (retail) {
		describe(`a retail food establishment: ${retail.test}`, () => {
			test("more to consumers is one, the same or less is none", () => {
				expect(/exceeds/.test(retail.test)).toBe(true)
				expect(isRetailFoodEstablishment({ consumerCents: 50_001, otherCents: 50_000 })).toBe(true)
				expect(isRetailFoodEstablishment({ consumerCents: 50_000, otherCents: 50_000 })).toBe(false)
				expect(isRetailFoodEstablishment({ consumerCents: 49_999, otherCents: 50_000 })).toBe(false)
			})
			test.each(retail.counts_as_direct)("%s counts as direct", (way) => {
				expect(DIRECT_SALES).toContain(way)
			})
		})
	}

	const list = traceability?.food_traceability_list
	if (list) {
		test("honey and the list of foods that need further records", () => {
			expect(HONEY_ON_TRACEABILITY_LIST).toBe(list.honey_listed)
			expect(list.categories.some((category) => /honey|comb/i.test(category))).toBe(list.honey_listed)
		})
	}
}
