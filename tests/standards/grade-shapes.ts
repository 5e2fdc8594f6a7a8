import { z } from "zod"

const text = z.string()
const figure = z.number()

const weights = z.looseObject({
	min_gross_oz: figure,
	min_net_oz: figure,
	attachment: text.optional(),
	unsealed: text,
	also: z.array(text).optional(),
})

/** The shape of the published grades of comb and names of colour. */
export const combGradesShape = z.looseObject({
	wisconsin: z
		.looseObject({
			fancy_white: weights.optional(),
			no_1: weights.optional(),
			chunk: z.looseObject({ comb_share_of_net_weight: figure, max_pieces: figure, broken_pieces: figure }).optional(),
			good_quality_excludes: z.array(text).optional(),
			colour_mm_pfund: z.record(text, text).optional(),
			ungraded_rule: text.optional(),
		})
		.optional(),
	usda_comb_1967: z.looseObject({ do_not_assert: z.boolean().optional() }).optional(),
	usda_colour_mm_pfund: z
		.looseObject({
			bands: z
				.array(
					z.looseObject({
						name: text,
						over: figure.nullable(),
						to: figure.nullable(),
						optical_density_max: figure.optional(),
					}),
				)
				.optional(),
		})
		.optional(),
	historic: z
		.array(
			z.looseObject({
				scheme: text,
				case_of: figure.optional(),
				case_net_lb: z.record(text, figure).optional(),
				min_section_oz: figure.optional(),
				fancy: text.optional(),
				no_1: text.optional(),
				no_2: text.optional(),
				no_3: text.optional(),
				uncapped_cells_per_side_excluding_outer_row: z.record(text, figure).optional(),
			}),
		)
		.optional(),
	california: z
		.looseObject({
			crystallised_comb: text.optional(),
			moisture_max_pct: figure.optional(),
			extracted_lot_tolerance_pct_by_count: figure.optional(),
		})
		.optional(),
})

/** The shapes of what is published about how honey keeps. */
export const keepingShape = {
	fermentation: z.array(z.looseObject({ moisture_pct: text, risk: text })).optional(),
	granulation: z
		.looseObject({
			glucose_water: z.array(z.looseObject({ ratio: text, tendency: text })).optional(),
			worst_temp: z.looseObject({ c: figure, f: figure, range_f: z.array(figure) }).optional(),
		})
		.optional(),
	usda_moisture_max: z.looseObject({ grade_a_b_pct: figure, grade_c_pct: figure }).optional(),
}
