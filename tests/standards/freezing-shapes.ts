import { z } from "zod"

/** The shape of the part of the topic "storage_and_freezing" that is about freezing, thawing and wax. */
export const freezingShape = {
	freeze_table: z
		.array(z.looseObject({ temp_c: z.number(), temp_f: z.number().optional(), hours: z.number() }))
		.optional(),
	freeze_practice: z.looseObject({ hours_min: z.number() }).optional(),
	thaw: z.looseObject({ rule: z.string() }).optional(),
	wax_c: z
		.looseObject({
			melts: z.tuple([z.number(), z.number()]),
			brittle_below: z.number(),
			soft_from: z.number(),
		})
		.optional(),
}

/** What this file reads of it. */
export const freezingHeldTo: Record<string, readonly string[]> = {
	"storage_and_freezing.freeze_table": ["temp_c", "temp_f", "hours"],
	"storage_and_freezing.freeze_practice": ["hours_min"],
	"storage_and_freezing.thaw": ["rule"],
	"storage_and_freezing.wax_c": ["melts", "brittle_below", "soft_from"],
}
