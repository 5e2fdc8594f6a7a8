import { z } from "zod"

/** Zones that a producer can choose; dates of deliveries and cut-offs are told in theirs. */
export const TIME_ZONES = [
	{ value: "America/New_York", label: "Eastern" },
	{ value: "America/Chicago", label: "Central" },
	{ value: "America/Denver", label: "Mountain" },
	{ value: "America/Phoenix", label: "Mountain, no summer time" },
	{ value: "America/Los_Angeles", label: "Pacific" },
	{ value: "America/Anchorage", label: "Alaska" },
	{ value: "Pacific/Honolulu", label: "Hawaii" },
] as const

const zones: readonly string[] = TIME_ZONES.map(({ value }) => value)

export const openDeskForm = z.object({
	name: z.string().trim().min(2, "Write the name of your yard.").max(80, "At most 80 letters."),
	slug: z
		.string()
		.trim()
		.toLowerCase()
		.regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, "Small letters, digits and single dashes only, such as larkmoor.")
		.min(3, "At least three letters.")
		.max(40, "At most 40 letters."),
	county: z.string().trim().max(80, "At most 80 letters."),
	timeZone: z.string().refine((zone) => zones.includes(zone), "Choose a time zone from the list."),
})
