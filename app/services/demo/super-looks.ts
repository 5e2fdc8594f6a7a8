import type { superChecks } from "~/db/schema"
import { addDays, type Day, daysBetween, instantAt } from "~/domain/calendar"
import { sharesOfSections } from "~/domain/crop/check-sections"
import { drawSections, percentOf } from "./draw-sections"
import { notAfter, type Season } from "./season"

type Check = typeof superChecks.$inferInsert

/** A super from the day it was set on to the last look into it; pieces, capped ones are full too. */
export type Looked = {
	superId: string
	capacity: number
	setOn: Day
	lastOn: Day
	full: number
	capped: number
	note: string
	isDrawn: boolean
	/** The capped share one look before the last, where it must tell a certain pace. */
	cappedPercentBefore?: number
}

export const DAYS_BETWEEN_LOOKS = 7

/** The checks of a super, the earliest first: one each week, filling steadily and capped later, as honey ripens. */
export function looksInto(season: Season, looked: Looked): Check[] {
	const { producerId, chance, scenario, userId, now } = season
	const days = daysBetween(looked.setOn, looked.lastOn)
	const looks = Math.max(1, Math.min(4, Math.floor(days / DAYS_BETWEEN_LOOKS)))
	return Array.from({ length: looks }, (_, index) => {
		const isLast = index === looks - 1
		const share = (index + 1) / looks
		const checkedOn = isLast ? looked.lastOn : addDays(looked.lastOn, -DAYS_BETWEEN_LOOKS * (looks - 1 - index))
		const sections = {
			capacity: looked.capacity,
			full: Math.floor(looked.full * share),
			capped: Math.floor(looked.capped * Math.max(0, share * 2 - 1)),
		}
		const drawn = isLast && looked.isDrawn ? drawSections(sections) : ""
		const noted = {
			filledPercent: percentOf(sections, sections.full),
			cappedPercent: percentOf(sections, sections.capped),
		}
		if (index === looks - 2) noted.cappedPercent = looked.cappedPercentBefore ?? noted.cappedPercent
		// Capped sections are filled.
		noted.filledPercent = Math.max(noted.filledPercent, noted.cappedPercent)
		return {
			producerId,
			id: chance.id(),
			superId: looked.superId,
			checkedOn,
			...(drawn === "" ? noted : sharesOfSections(drawn)),
			sections: drawn,
			note: isLast ? looked.note : "",
			photoId: null,
			checkedBy: userId(scenario.ownerEmail),
			receivedAt: notAfter(now, instantAt(checkedOn, "11:00", scenario.timeZone)),
		}
	})
}
