import { compare, exactly, type Fraction, fraction, times } from "../scale/fraction"

/** Panels up to so many square inches, and the least height of the letters in sixteenths of an inch. */
const HEIGHTS: readonly [toSquareInches: number, sixteenths: number][] = [
	[5, 1],
	[25, 2],
	[100, 3],
	[400, 4],
	[Number.POSITIVE_INFINITY, 8],
]

/** The part of the panel, from below, in which the net weight stands, in percent. Source: 21 CFR 101.7(f). */
export const BOTTOM_PERCENT = 30
/** Panels up to this many square inches may bear it anywhere. Source: 21 CFR 101.7(f). */
export const FREE_PANEL_SQUARE_INCHES = 5

/**
 * The least height of the letters of the net weight, in sixteenths of an inch, by the area of the panel that faces the
 * buyer. It is the height of capitals, or of the "o" where small letters are used; one sixteenth more when it is blown,
 * embossed or moulded. Throws RangeError on no area. Source: 21 CFR 101.7(h), (i) (read as quoted).
 */
export function leastTypeSixteenths(panelSquareInches: Fraction, isMoulded = false): number {
	if (panelSquareInches.top <= 0n) throw new RangeError("a panel has an area")
	const row = HEIGHTS.find(([to]) => !Number.isFinite(to) || compare(panelSquareInches, exactly(to)) <= 0)
	return (row?.[1] ?? 8) + (isMoulded ? 1 : 0)
}

/** Sixteenths of an inch as they are written: 2 is "1/8", 8 "1/2", 16 "1". */
export function inchWords(sixteenths: number): string {
	let [top, bottom] = [sixteenths, 16]
	while (top % 2 === 0 && bottom > 1) [top, bottom] = [top / 2, bottom / 2]
	return bottom === 1 ? `${top}` : `${top}/${bottom}`
}

/** Whether a panel of this size may bear the net weight anywhere, not only in its lower part. */
export function isFreeOfPlace(panelSquareInches: Fraction): boolean {
	return compare(panelSquareInches, exactly(FREE_PANEL_SQUARE_INCHES)) <= 0
}

/** Pi to fifteen decimals: an area is never nearer to a boundary than that. */
const PI = exactly("3.141592653589793")
const SHARE_OF_ROUND = fraction(2n, 5n)

/** What faces the buyer, in inches (square inches for the surface of any other shape). */
export type Panel =
	| { shape: "rectangle"; width: Fraction; height: Fraction }
	| { shape: "cylinder"; diameter: Fraction; height: Fraction }
	| { shape: "other"; surface: Fraction }

/**
 * The area of the panel in square inches: a whole side of a box, 40 % of height by circumference of a round package, 40 %
 * of the surface of any other. Source: 21 CFR 101.1 (rectangle and cylinder read as quoted; other shapes from memory, high).
 */
export function panelArea(panel: Panel): Fraction {
	if (panel.shape === "rectangle") return times(panel.width, panel.height)
	if (panel.shape === "other") return times(SHARE_OF_ROUND, panel.surface)
	return times(SHARE_OF_ROUND, times(panel.height, times(PI, panel.diameter)))
}
