import { dayWords, shortMonthDay } from "~/domain/calendar"
import { countsIn, type PromisePart, type SupplyPart } from "~/domain/promise/explain-free"
import type { FreeFigure } from "~/services/promise/find-free-figure.server"
import type { FigurePart } from "~/ui/stock/figure-lines"

/** More lines than anyone reads; the rest is summed. */
const MOST_LINES = 100

const SUPPLY_NOTES: Record<SupplyPart, string> = {
	there: "",
	"over-but-needed": "over by then, and needed for earlier promises that would else take from this day",
	over: "past its best-before by then",
	"later-but-needed": "comes later, and needed for later promises that would else take from this day",
	later: "comes later",
}

/** The lots and the crop as lines: those that count for the day, and those that do not. */
export function supplyParts(figure: FreeFigure, lotsHref: string): { counted: FigurePart; apart: FigurePart } {
	const line = (supply: FreeFigure["supplies"][number], index: number) => ({
		key: `${supply.lotCode ?? "crop"} ${supply.on} ${index}`,
		name: supply.lotCode ?? "Crop",
		to: supply.lotCode === null ? null : `${lotsHref}/${encodeURIComponent(supply.lotCode)}`,
		about: aboutSupply(supply, figure.cropFigure),
		when: `best before ${shortMonthDay(supply.until)}, ${supply.until.slice(0, 4)}`,
		note: SUPPLY_NOTES[supply.part],
		pieces: supply.quantity,
	})
	return {
		counted: part(figure.supplies.filter((supply) => countsIn(supply.part)).map(line)),
		apart: part(figure.supplies.filter((supply) => !countsIn(supply.part)).map(line)),
	}
}

function aboutSupply({ kind, on }: FreeFigure["supplies"][number], cropFigure: "low" | "likely"): string {
	if (kind === "free") return "released, there now"
	if (kind === "held") return `held until ${dayWords(on)}`
	return `off the hives ${dayWords(on)}, ${cropFigure} figure`
}

/** The orders as lines: those that take from the day, and those that do not. */
export function promiseParts(
	figure: FreeFigure,
	page: { day: string; ordersHref: string | null },
): { counted: FigurePart; apart: FigurePart } {
	const noteOf = (promise: { part: PromisePart; on: string }) => {
		if (promise.part === "takes") return ""
		return promise.on < page.day ? "met by lots that do not keep until this day" : "met by what is there or comes later"
	}
	const line = (promise: FreeFigure["promises"][number]) => ({
		key: String(promise.orderNumber),
		name: `Order ${promise.orderNumber}`,
		to: page.ordersHref && `${page.ordersHref}/${promise.orderNumber}`,
		about: promise.storeName,
		when:
			promise.on === promise.deliveryOn ? dayWords(promise.on) : `was due ${dayWords(promise.deliveryOn)}, still owed`,
		note: noteOf(promise),
		pieces: promise.quantity,
	})
	return {
		counted: part(figure.promises.filter((promise) => promise.part === "takes").map(line)),
		apart: part(figure.promises.filter((promise) => promise.part === "met-apart").map(line)),
	}
}

function part(lines: FigurePart["lines"]): FigurePart {
	const rest = lines.slice(MOST_LINES)
	return {
		lines: lines.slice(0, MOST_LINES),
		restLines: rest.length,
		restPieces: rest.reduce((sum, line) => sum + line.pieces, 0),
	}
}
