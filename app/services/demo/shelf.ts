import { addDays, type Day, instantAt } from "~/domain/calendar"
import type { CatalogueProduct } from "./plan-catalogue"
import type { Season } from "./season"

/** So many pieces of one lot. */
export type Taken = { lot: ShelfLot; pieces: number }

export type ShelfLot = {
	id: string
	code: string
	product: CatalogueProduct
	harvestedOn: Day
	releasedAt: Date
	/** Released pieces; what broke comes on top. */
	pieces: number
	brokenPieces: number
	ready: number
}

/** Released comb of one product, taken earliest harvest first; a new lot comes off the hives when it runs short. */
export type Shelf = {
	lots: ShelfLot[]
	/** Takes `pieces` on a day; each day asked is the same as the one before or later. */
	take: (pieces: number, on: Day) => Taken[]
	/** Makes what is ready come to exactly `pieces`: the last lots get smaller, or one more is released. */
	settle: (pieces: number, today: Day) => void
	/** The code of the next lot of the product. */
	nextCode: () => string
}

const DAYS_TO_RELEASE = 6

/** An empty shelf for one product. */
export function openShelf(season: Season, product: CatalogueProduct): Shelf {
	const { chance, scenario } = season
	const lots: ShelfLot[] = []
	let coded = 0
	const nextCode = () => {
		coded += 1
		return `${product.lotLetter}${String(coded).padStart(2, "0")}`
	}
	const harvest = (pieces: number, harvestedOn: Day, daysToRelease: number) => {
		const lot = {
			id: chance.id(),
			code: nextCode(),
			product,
			harvestedOn,
			releasedAt: instantAt(addDays(harvestedOn, daysToRelease), "17:00", scenario.timeZone),
			pieces,
			brokenPieces: chance.whole(0, 3),
			ready: pieces,
		}
		lots.push(lot)
	}
	return {
		lots,
		nextCode,
		take: (pieces, on) => {
			const short = pieces - lots.reduce((sum, lot) => sum + lot.ready, 0)
			if (short > 0) harvest(Math.max(short, product.harvestPieces), addDays(on, -10), DAYS_TO_RELEASE)
			const taken: Taken[] = []
			let needed = pieces
			for (const lot of lots) {
				if (needed === 0) break
				const some = Math.min(needed, lot.ready)
				if (some === 0) continue
				lot.ready -= some
				needed -= some
				taken.push({ lot, pieces: some })
			}
			return taken
		},
		settle: (pieces, today) => {
			let over = lots.reduce((sum, lot) => sum + lot.ready, 0) - pieces
			if (over < 0) harvest(-over, addDays(today, -7), 5)
			for (const lot of lots.toReversed()) {
				if (over <= 0) break
				const less = Math.min(over, lot.ready)
				lot.ready -= less
				lot.pieces -= less
				over -= less
			}
		},
	}
}
