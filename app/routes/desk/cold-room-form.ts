import { z } from "zod"
import { PROBE_PLACES, type TemperatureUnit } from "~/domain/cold-room/freezing"
import { momentNamed } from "~/domain/cold-room/wall-clock"

const UNIT = z.enum(["C", "F"])

/** A load as typed; `zone` is the producer's, in which the time is meant. */
export function startLoadForm(zone: string) {
	return z.object({
		loadId: z.guid(),
		freezer: z.string().trim().min(1, "Name the freezer.").max(80, "Shorten the freezer's name to 80 characters."),
		loadedAt: z.string().transform((text, context) => {
			const at = momentNamed(text, zone)
			if (at) return at
			context.addIssue({ code: "custom", message: "Write the day and the time at which it went in." })
			return z.NEVER
		}),
	})
}

/** Pieces of a lot in a load: blank is none; null is not a count. */
export function piecesTyped(text: string): number | null {
	if (text.trim() === "") return 0
	return /^\d{1,6}$/.test(text.trim()) ? Number(text.trim()) : null
}

/** A number with a point or a comma and either minus sign. */
const figure = z
	.string()
	.trim()
	.transform((text) => text.replace(/^[−–]/, "-").replace(",", "."))

/** A treatment read off a thermometer: degrees, hours, where the probe was. */
export const treatmentForm = z.object({
	proofId: z.guid(),
	temperature: figure
		.refine((text) => /^[+-]?\d{1,3}(\.\d+)?$/.test(text), "Write the temperature in degrees, such as -18.")
		.transform(Number)
		.refine(
			(degrees) => degrees >= -100 && degrees <= 100,
			"No freezer is as cold or warm as that. Look at the figure again.",
		),
	degrees: UNIT,
	hours: figure
		.refine((text) => /^\d{1,4}(\.\d+)?$/.test(text), "Write the hours, such as 48 or 2.5.")
		.transform((text) => Math.floor(Number(text) * 60))
		.refine((minutes) => minutes > 0, "Write more than no time."),
	place: z.enum(PROBE_PLACES, "Choose where the probe was."),
	note: z.string().trim().max(400, "Shorten the note to 400 characters."),
})

/** What stands before the file in the form of a logger. */
export const loggerForm = z.object({
	proofId: z.guid(),
	probe: z.enum(PROBE_PLACES, "Choose where the probe was."),
	unit: z.union([z.literal("").transform((): TemperatureUnit | null => null), UNIT]),
	dates: z.union([z.literal("").transform(() => null), z.enum(["month-first", "day-first"])]),
})

/** The number of an address; null unless it is one. */
export function loadNumber(text: string): number | null {
	return /^[1-9]\d{0,8}$/.test(text) ? Number(text) : null
}
