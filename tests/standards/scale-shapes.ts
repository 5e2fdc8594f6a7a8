import { z } from "zod"

const entry = z.record(z.string(), z.unknown())
const entries = z.array(entry)

/** One case of a file, whatever fields it has; what is not understood of it is told. */
export type Entry = z.infer<typeof entry>

/** What is held of weighing a lot: a file may have any of these sections, and in them any number of cases. */
export const netContentsShape = z.looseObject({
	sampling_category_a: z.looseObject({ rows: entries }).optional(),
	sampling_category_b: z.looseObject({ rows: entries }).optional(),
	mav_by_weight: z.looseObject({ rows: entries.optional(), cross_checks: entries.optional() }).optional(),
	mav_lookups: entries.optional(),
	scale_rule: z.looseObject({ example: z.string().optional() }).optional(),
	larger_declaration: z.looseObject({ cases: entries }).optional(),
	dimensionless: entries.optional(),
	moisture: entry.optional(),
	examples: entries.optional(),
})

/** What is held of bar codes. */
export const barcodesShape = z.looseObject({
	check_digit: entry.optional(),
	check_digit_examples: entries.optional(),
	price_digit_tables: entry.optional(),
	price_digit_examples: entries.optional(),
	restricted_upc: entry.optional(),
	ais: entries.optional(),
	element_strings: entries.optional(),
})

/** What is held of labels and prices by weight. */
export const labellingShape = z.looseObject({
	type_size: entries.optional(),
	placement: entry.optional(),
	terms: entry.optional(),
	pdp_examples: entries.optional(),
	random_package: entry.optional(),
	unit_price: z.looseObject({ examples: entries.optional() }).optional(),
	computed_price: z
		.looseObject({
			examples: z.array(z.looseObject({ weight: z.string(), unit_price: z.string(), half_up: z.string() })),
		})
		.optional(),
	declarations: z.array(z.looseObject({ net_oz: z.number(), text: z.string() })).optional(),
})

/** The sections of these topics that tests read, with the fields of their entries. */
export const scaleHeldTo: Record<string, readonly string[]> = {
	"net_contents.sampling_category_a": [],
	"net_contents.sampling_category_b": [],
	"net_contents.mav_by_weight": [],
	"net_contents.mav_lookups": [],
	"net_contents.scale_rule": [],
	"net_contents.larger_declaration": [],
	"net_contents.dimensionless": ["error", "unit", "units"],
	"net_contents.moisture": [],
	"net_contents.examples": [],
	"barcodes.check_digit": [],
	"barcodes.check_digit_examples": ["body", "check", "full", "kind"],
	"barcodes.price_digit_tables": [],
	"barcodes.price_digit_examples": ["price", "digit"],
	"barcodes.restricted_upc": [],
	"barcodes.ais": ["ai", "data", "title", "fnc1", "needs"],
	"barcodes.element_strings": ["human", "data", "meaning"],
	"labelling.type_size": ["pdp_over_sq_in", "pdp_to_sq_in", "min_height_in"],
	"labelling.placement": [],
	"labelling.terms": [],
	"labelling.pdp_examples": ["panel", "area", "min_type"],
	"labelling.random_package": [],
	"labelling.unit_price": ["price", "net_oz", "per_oz_cents_exact", "tenth", "whole", "per_oz", "per_lb"],
	"labelling.computed_price": ["weight", "unit_price", "half_up"],
	"labelling.declarations": ["net_oz", "text"],
}
