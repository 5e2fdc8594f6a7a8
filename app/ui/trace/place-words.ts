import type { Place } from "~/domain/stock/places"

/** The places of the stock ledger as pages name them. */
export const PLACE_WORDS: Record<Place, string> = {
	"cold-room": "Cold room",
	ready: "Ready shelf",
	packed: "Packed",
	van: "On the van",
	market: "At market",
	sold: "Sold",
	waste: "Waste",
	"cut-up": "Cut up",
	"other-lot": "In another lot",
	missing: "Missing at a count",
}
