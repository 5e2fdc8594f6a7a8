/**
 * `part` of `whole` in whole percent, to the nearest, half up; but nothing short of all is 100, and nothing above none is
 * 0. Null where there is no whole. Throws RangeError unless 0 <= part <= whole, both whole numbers.
 */
export function wholePercent(part: number, whole: number): number | null {
	for (const given of [part, whole - part])
		if (!Number.isSafeInteger(given) || given < 0) throw new RangeError(`not a part of ${whole}: ${part}`)
	if (whole === 0) return null
	if (part === 0 || part === whole) return part === 0 ? 0 : 100
	return Math.min(99, Math.max(1, Math.floor((200 * part + whole) / (2 * whole))))
}

/** Where the pieces of a crop are by now, those that went into other lots of the same product counted there. */
export type CropPieces = {
	soldPieces: number
	/** Anywhere on hand: cold room, shelves, packed, van, a market's table. */
	stockPieces: number
	wastePieces: number
	missingPieces: number
	/** Cut up into another product, where they are counted anew. */
	cutUpPieces: number
}

/** All pieces of a crop: each is somewhere. */
export function harvestedPieces(crop: CropPieces): number {
	return crop.soldPieces + crop.stockPieces + crop.wastePieces + crop.missingPieces + crop.cutUpPieces
}

/** How much of a crop that was to be sold is sold, in whole percent: what was cut up is another product's crop. */
export function soldPercent(crop: CropPieces): number | null {
	return wholePercent(crop.soldPieces, harvestedPieces(crop) - crop.cutUpPieces)
}
