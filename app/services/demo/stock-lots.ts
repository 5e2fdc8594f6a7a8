import { addDays, compareDays, type Day, dayInZone, instantAt } from "~/domain/calendar"
import { type Ledger, move } from "./ledger"
import type { CatalogueProduct } from "./plan-catalogue"
import type { Shelf } from "./shelf"

const DAYS_TO_BEST_BEFORE = 300

/** The lots of a shelf: off the hives, then released but for what broke. */
export function writeLots(ledger: Ledger, shelf: Shelf): void {
	for (const lot of shelf.lots) {
		writeLot(ledger, lot, { state: "released", releaseOn: dayInZone(lot.releasedAt, ledger.season.scenario.timeZone) })
		move(ledger, { lot, pieces: lot.pieces }, lot.releasedAt, {
			fromPlace: "cold-room",
			toPlace: "ready",
			reason: "released",
		})
		if (lot.brokenPieces === 0) continue
		move(ledger, { lot, pieces: lot.brokenPieces }, lot.releasedAt, {
			fromPlace: "cold-room",
			toPlace: "waste",
			reason: "broken on weighing",
		})
	}
}

/** The lot row and its pieces coming off the hives. */
function writeLot(
	ledger: Ledger,
	lot: Shelf["lots"][number],
	{ state, releaseOn }: { state: "held" | "released"; releaseOn: Day },
): void {
	const { producerId, scenario } = ledger.season
	const pieces = lot.pieces + lot.brokenPieces
	ledger.lots.push({
		producerId,
		id: lot.id,
		code: lot.code,
		productId: lot.product.id,
		state,
		harvestedOn: lot.harvestedOn,
		expectedReleaseOn: releaseOn,
		bestBeforeOn: addDays(lot.harvestedOn, DAYS_TO_BEST_BEFORE),
		piecesHarvested: pieces,
		yard: lot.product.yard,
		createdAt: instantAt(lot.harvestedOn, "16:00", scenario.timeZone),
	})
	const at = instantAt(lot.harvestedOn, "16:00", scenario.timeZone)
	move(ledger, { lot, pieces }, at, { fromPlace: null, toPlace: "cold-room", reason: "off the hives" })
}

/** The lot of a product that is still held, where there is one. */
export function writeHeld(ledger: Ledger, product: CatalogueProduct, nextCode: () => string): void {
	const { chance, today, days } = ledger.season
	const { held } = product
	if (!held) return
	const lot = {
		id: chance.id(),
		code: nextCode(),
		product,
		harvestedOn: addDays(today, -3),
		releasedAt: days.closed.cutoffAt,
		pieces: held.cases * product.piecesPerCase,
		brokenPieces: 0,
		ready: 0,
	}
	const wanted = addDays(today, held.inDays)
	const firstOpenOn = days.open[0]?.on ?? wanted
	writeLot(ledger, lot, { state: "held", releaseOn: compareDays(wanted, firstOpenOn) < 0 ? wanted : firstOpenOn })
}
