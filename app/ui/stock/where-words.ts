import type { CountedPlace } from "~/domain/stock/count-place"
import type { Place } from "~/domain/stock/places"

/** A place that is counted, inside a sentence: "the cold room". `of` names a market and its day. */
export function countedPlaceName(place: CountedPlace, of: string | null): string {
	if (place === "cold-room") return "the cold room"
	return place === "ready" ? "the ready shelf" : `the table at ${of ?? "a market"}`
}

const WHERE: Record<Place, string> = {
	"cold-room": "in the cold room",
	ready: "on the ready shelf",
	packed: "packed",
	van: "on the van",
	market: "at market",
	sold: "sold",
	waste: "waste",
	"cut-up": "cut up",
	"other-lot": "in another lot",
	missing: "missing",
}

/** Where pieces are, inside a sentence: "on the ready shelf", "at market, Copse Green, August 15". */
export function whereWords(place: Place, of: string | null = null): string {
	return place === "market" && of ? `at market, ${of}` : WHERE[place]
}
