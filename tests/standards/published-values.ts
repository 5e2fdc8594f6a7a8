import { readFileSync } from "node:fs"
import { z } from "zod"
import { freezingHeldTo, freezingShape } from "./freezing-shapes"
import { combGradesShape, keepingShape } from "./grade-shapes"
import { barcodesShape, labellingShape, netContentsShape, scaleHeldTo } from "./scale-shapes"

const day = z.iso.date()
const text = z.string()
const amounts = z.array(z.number())

/** A share of an estate, as a fraction and as a decimal. */
const shareShape = z.looseObject({ exact: text.optional(), decimal: z.number() })

/** The shapes of the values that a rule of the product is held to; keys beside these are let through and reported. */
const valuesSchema = z.looseObject({
	comb_grades: combGradesShape.optional(),
	storage_and_freezing: z.looseObject({ ...keepingShape, ...freezingShape }).optional(),
	terms: z
		.looseObject({
			due_dates: z.array(z.record(text, day)).optional(),
			ageing: z.array(text).optional(),
			trade_credit: z
				.array(
					z.looseObject({
						discount_pct: z.number(),
						discount_days: z.number(),
						paid_day: z.number(),
						nominal_365: z.number().optional(),
						nominal_360: z.number().optional(),
						effective_365: z.number().optional(),
					}),
				)
				.optional(),
		})
		.optional(),
	planning: z
		.looseObject({
			atp: z
				.array(
					z.looseObject({
						id: text,
						on_hand: z.number(),
						mps: amounts,
						orders: amounts,
						discrete_raw: z.array(z.number().nullable()).optional(),
						discrete_after_carry_back: z.array(z.number().nullable()).optional(),
						cumulative_without_lookahead: amounts.optional(),
						cumulative_with_lookahead: amounts.optional(),
					}),
				)
				.optional(),
		})
		.optional(),
	calendar: z
		.looseObject({
			rrule: z
				.array(
					z.looseObject({ name: text, dtstart: text, tzid: text.optional(), rrule: text, dates: z.array(day).min(1) }),
				)
				.optional(),
		})
		.optional(),
	net_contents: netContentsShape.optional(),
	barcodes: barcodesShape.optional(),
	labelling: labellingShape.optional(),
	allocation: z
		.looseObject({
			tables: z
				.array(
					z.looseObject({
						estate: z.number(),
						claims: amounts,
						proportional: z.array(shareShape).optional(),
						constrained_equal_awards: z.array(shareShape).optional(),
						constrained_equal_losses: z.array(shareShape).optional(),
						talmud: z.array(shareShape).optional(),
					}),
				)
				.optional(),
			largest_remainder: z
				.array(z.looseObject({ id: text, weights: amounts, total: z.number(), result: amounts }))
				.optional(),
		})
		.optional(),
	traceability: z
		.looseObject({
			receive_1_337: z.array(text).optional(),
			release_1_345: z.array(text).optional(),
			retention_1_360: z.array(z.looseObject({ spoils_or_loses_value: text, keep: text })).optional(),
			availability_1_361: text.optional(),
			exclusions_1_327: z.looseObject({ direct_to_consumer_sales: text.optional() }).optional(),
			retail_food_establishment: z.looseObject({ test: text, counts_as_direct: z.array(text) }).optional(),
			food_traceability_list: z.looseObject({ honey_listed: z.boolean(), categories: z.array(text) }).optional(),
		})
		.optional(),
})

/** The repository's own values. */
export const ownValuesPath = new URL("published-values.json", import.meta.url).pathname

export type PublishedValues = z.infer<typeof valuesSchema>

/** Reads a file of published values; throws with the place of the first entry that has another shape. */
export function readValues(path: string): PublishedValues {
	return valuesSchema.parse(JSON.parse(readFileSync(path, "utf8")))
}

/**
 * What the files beside this one read, by "topic.section": the fields of an entry that are checked. An empty list stands
 * for entries that are read whole.
 */
export const heldTo: Record<string, readonly string[]> = {
	"terms.due_dates": [],
	"terms.ageing": [],
	"terms.trade_credit": ["discount_pct", "discount_days", "paid_day", "nominal_365", "nominal_360", "effective_365"],
	"planning.atp": [
		"on_hand",
		"mps",
		"orders",
		"discrete_raw",
		"discrete_after_carry_back",
		"cumulative_without_lookahead",
		"cumulative_with_lookahead",
	],
	"calendar.rrule": ["dtstart", "tzid", "rrule", "dates"],
	...scaleHeldTo,
	"allocation.tables": [
		"estate",
		"claims",
		"proportional",
		"constrained_equal_awards",
		"constrained_equal_losses",
		"talmud",
	],
	"allocation.largest_remainder": ["weights", "total", "result"],
	"traceability.receive_1_337": [],
	"traceability.release_1_345": [],
	"traceability.retention_1_360": ["spoils_or_loses_value", "keep"],
	"traceability.exclusions_1_327": ["direct_to_consumer_sales"],
	"traceability.retail_food_establishment": [],
	"traceability.food_traceability_list": [],
	"comb_grades.wisconsin": [],
	"comb_grades.usda_comb_1967": [],
	"comb_grades.usda_colour_mm_pfund": [],
	"comb_grades.historic": [],
	"comb_grades.california": [],
	...freezingHeldTo,
	"storage_and_freezing.fermentation": ["moisture_pct", "risk"],
	"storage_and_freezing.granulation": [],
	"storage_and_freezing.usda_moisture_max": [],
}
