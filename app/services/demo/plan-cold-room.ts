import type { freezeProofs, freezerLoadLots, freezerLoads, lots } from "~/db/schema"
import { addDays, type Day, instantAt } from "~/domain/calendar"
import { coolingAllowance, enteredRuns, judgeFreezing } from "~/domain/cold-room/freezing"
import { readFreezerLog } from "./freezer-log"
import { grouped, minutesAfter, type Season } from "./season"

type Lot = typeof lots.$inferInsert
type Proof = typeof freezeProofs.$inferInsert

export type ColdRoom = {
	/** The proof of each lot's freezing, by the lot's id. */
	proofs: ReadonlyMap<string, string>
	rows: {
		loads: (typeof freezerLoads.$inferInsert)[]
		loadLots: (typeof freezerLoadLots.$inferInsert)[]
		proofs: Proof[]
	}
}

/** Hours until the middle of a case has reached the cold, and how long it is then left: two days in all; common practice, no source. */
const HOURS = { toReach: 6, held: 42 }
const MINUTES_AN_HOUR = 60
/** So many of the last loads have a curve; those before were entered by hand. */
const LOGGED = 3

/**
 * A freezer load for each day on which lots came off the hives, with its proof. The first of the held lots lies in a load
 * that is still running. Lots in `without` were split off lots that had been frozen, or
 * have no load on record.
 */
export function planColdRoom(season: Season, stock: readonly Lot[], without: ReadonlySet<string>): ColdRoom {
	const { scenario, today } = season
	const running = stock.find((lot) => lot.state === "held")
	const frozen = stock.filter((lot) => lot !== running && !without.has(lot.id ?? ""))
	const days = [...grouped(frozen, (lot) => lot.harvestedOn)].toSorted(([a], [b]) => (a < b ? -1 : 1))
	const rows: ColdRoom["rows"] = { loads: [], loadLots: [], proofs: [] }
	const proofs = new Map<string, string>()
	for (const [index, [harvestedOn, lotsOfDay]] of days.entries()) {
		const loadedAt = instantAt(harvestedOn, "19:00", scenario.timeZone)
		const proof = proofOf(season, { harvestedOn, loadedAt, isLogged: index >= days.length - LOGGED })
		load(season, rows, { id: proof.loadId, loadedAt, provenAt: proof.createdAt, lots: lotsOfDay })
		rows.proofs.push(proof)
		for (const lot of lotsOfDay) proofs.set(lot.id ?? "", proof.id)
	}
	if (running) {
		const loadedAt = instantAt(addDays(today, -1), "18:30", scenario.timeZone)
		load(season, rows, { id: season.chance.id(), loadedAt, provenAt: null, lots: [running] })
	}
	return { proofs, rows }
}

function load(
	{ producerId, scenario, userId }: Season,
	rows: ColdRoom["rows"],
	{ id, loadedAt, provenAt, lots }: { id: string; loadedAt: Date; provenAt: Date | null; lots: readonly Lot[] },
): void {
	rows.loads.push({
		producerId,
		id,
		number: rows.loads.length + 1,
		freezer: rows.loads.length % 3 === 2 ? "Chest freezer" : "Walk-in freezer",
		loadedAt,
		provenAt,
		loadedBy: userId(scenario.packerEmail),
	})
	for (const lot of lots) {
		rows.loadLots.push({ producerId, loadId: id, lotId: lot.id ?? "", pieces: lot.piecesHarvested })
	}
}

/** The treatment of a load, kept far longer than the table asks: entered by hand, or read from a logger's file. */
function proofOf(
	{ producerId, chance, scenario, userId }: Season,
	{ harvestedOn, loadedAt, isLogged }: { harvestedOn: Day; loadedAt: Date; isLogged: boolean },
): Proof & { id: string; createdAt: Date } {
	const coldAt = minutesAfter(loadedAt, HOURS.toReach * MINUTES_AN_HOUR)
	const outAt = minutesAfter(coldAt, HOURS.held * MINUTES_AN_HOUR)
	const { verdict, ...found } = isLogged
		? readFreezerLog({ loadedAt, coldAt, outAt }, scenario.timeZone)
		: { ...enteredByHand(), note: "Thermometer in the middle of the middle case." }
	return {
		producerId,
		id: chance.id(),
		loadId: chance.id(),
		kind: isLogged ? "logger" : "entry",
		isAccepted: verdict.isProven,
		rowTenthsC: verdict.row.tenthsC,
		requiredMinutes: verdict.row.minutes,
		heldMinutes: verdict.countedMinutes,
		...found,
		fileName: isLogged ? `freezer-${harvestedOn}.csv` : "",
		enteredBy: userId(scenario.packerEmail),
		createdAt: minutesAfter(outAt, 25),
	}
}

function enteredByHand() {
	const entered = { temperature: -18, unit: "C", minutes: HOURS.held * MINUTES_AN_HOUR, probe: "comb" } as const
	return { verdict: judgeFreezing(enteredRuns(entered), coolingAllowance(entered.probe)), report: { entered } }
}
