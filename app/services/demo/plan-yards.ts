import type { hives, superChecks, supers, yards } from "~/db/schema"
import { addDays, type Day, daysBetween } from "~/domain/calendar"
import { percentOf } from "./draw-sections"
import type { Catalogue } from "./plan-catalogue"
import type { DemoSuper } from "./scenario"
import { named, type Season } from "./season"
import { DAYS_BETWEEN_LOOKS, looksInto } from "./super-looks"

export type Yards = {
	/** The hives of each yard, by its name. */
	hiveIds: ReadonlyMap<string, string[]>
	rows: {
		yards: (typeof yards.$inferInsert)[]
		hives: (typeof hives.$inferInsert)[]
		supers: (typeof supers.$inferInsert)[]
		checks: (typeof superChecks.$inferInsert)[]
	}
}

/** A usual super of sections: four rows of ten; common practice, no source. */
export const SUPER_PIECES = 40

/** The capped share at which a producer who has set none takes a super off. */
const READY_PERCENT = 90

/** The yards, their hives, and the supers that are on them today with every look into them. */
export function planYards(season: Season, catalogue: Catalogue): Yards {
	const { producerId, chance, scenario } = season
	const rows: Yards["rows"] = { yards: [], hives: [], supers: [], checks: [] }
	const hiveIds = new Map<string, string[]>()
	for (const yard of scenario.yards) {
		const yardId = chance.id()
		rows.yards.push({ producerId, id: yardId, name: yard.name, flora: yard.flora })
		hiveIds.set(
			yard.name,
			yard.hives.map((stack) => {
				const hiveId = chance.id()
				rows.hives.push({ producerId, id: hiveId, yardId, label: String(rows.hives.length + 1) })
				for (const [index, box] of stack.entries()) {
					setOn(season, rows, { box, hiveId, level: index + 1, productId: named(catalogue.products, box.code).id })
				}
				return hiveId
			}),
		)
	}
	return { hiveIds, rows }
}

function setOn(
	season: Season,
	rows: Yards["rows"],
	{ box, hiveId, level, productId }: { box: DemoSuper; hiveId: string; level: number; productId: string },
): void {
	const { producerId, chance, today } = season
	const superId = chance.id()
	const setOnDay = addDays(today, -box.setDaysAgo)
	rows.supers.push({
		producerId,
		id: superId,
		hiveId,
		productId,
		capacityPieces: SUPER_PIECES,
		setOn: setOnDay,
		level,
		state: box.escapeDaysAgo === undefined ? "on" : "clearing",
		clearingOn: box.escapeDaysAgo === undefined ? null : addDays(today, -box.escapeDaysAgo),
	})
	if (!box.looked) return
	const { daysAgo, full, capped, isDrawn = false, note = "" } = box.looked
	const lastOn = addDays(today, -daysAgo)
	const looked = { superId, capacity: SUPER_PIECES, setOn: setOnDay, lastOn, full, capped, note, isDrawn }
	rows.checks.push(...looksInto(season, { ...looked, ...paceOf(season, box, lastOn) }))
}

/** The capped share a week before the last look from which a straight line leads to the day the super is meant for. */
function paceOf({ days, today }: Season, box: DemoSuper, lastOn: Day): { cappedPercentBefore?: number } {
	if (!box.looked || box.readyAfterDays === undefined) return {}
	const readyOn = addDays(days.open[0]?.on ?? today, box.readyAfterDays)
	const capped = percentOf({ capacity: SUPER_PIECES }, box.looked.capped)
	const weeks = daysBetween(lastOn, readyOn) / DAYS_BETWEEN_LOOKS
	return { cappedPercentBefore: Math.max(0, capped - Math.ceil((READY_PERCENT - capped) / weeks)) }
}
