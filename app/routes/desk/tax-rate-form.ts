import { z } from "zod"
import { readDay } from "~/domain/pricing/read-figures"

const MOST_BASIS_POINTS = 3_000

/** A share in percent as typed, as basis points; 0 is a rate too. */
const percent = z.string().transform((typed, context) => {
	const [, whole, part = ""] = /^(\d{1,2})(?:[.,](\d{1,2}))?\s*%?$/.exec(typed.trim()) ?? []
	const points = whole === undefined ? Number.NaN : Number(whole) * 100 + Number(part.padEnd(2, "0"))
	if (points <= MOST_BASIS_POINTS) return points
	context.addIssue({ code: "custom", message: "Write a percentage up to 30, such as 7.25." })
	return z.NEVER
})

/** A rate of a place from a day on, as typed. */
export const taxRateForm = z.object({
	place: z.string().trim().min(1, "Name the place.").max(80, "Shorten the name to 80 characters."),
	percent,
	validFrom: z.string().transform((typed, context) => {
		const day = readDay(typed)
		if (day) return day
		context.addIssue({ code: "custom", message: "Write a day, such as 2026-08-18." })
		return z.NEVER
	}),
})

/** The rate where no place is named, as typed. */
export const ownRateForm = z.object({ ownPercent: percent })
