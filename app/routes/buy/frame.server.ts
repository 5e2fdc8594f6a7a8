import {
	addDays,
	type Day,
	dayInZone,
	daysBetween,
	dayWords,
	shortDay,
	timeWords,
	weekday,
	weekdayName,
} from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { type FortnightDay, findFortnight } from "~/services/orders/find-fortnight.server"

import type { CutoffThread } from "~/ui/layout/cutoff-threads"
import type { RibbonDay } from "~/ui/layout/ribbon"
import type { StoreScope } from "../guard.server"

/** The parts of a store's book, as the thumb index names them. */
const PARTS = [
	["sheet", "Order sheet"],
	["standing", "Standing order"],
	["deliveries", "Deliveries"],
	["invoices", "Invoices"],
	["details", "Our details"],
] as const

export type BuyPart = (typeof PARTS)[number][0]

/** What every page of a store's book shows around its sheet. */
export type BuyFrame = {
	masthead: {
		homeHref: string
		who: string
		place: string
		now: string
		person: { name: string; href: string; signOutAction: string }
	}
	ribbon: { label: string; days: RibbonDay[]; threads: CutoffThread[]; earlierHref?: string; laterHref?: string }
	tabs: { to: string; label: string; current: boolean }[]
}

/**
 * The frame of a store's page: who, where, today, the delivery days of a fortnight, the parts of the book. `day` is the day
 * the page is about, and decides the fortnight; a page that has read the ribbon already hands it in.
 */
export async function findBuyFrame(
	{ producer, store, person }: StoreScope,
	page: { part: BuyPart; day?: Day; now?: Date; fortnight?: readonly FortnightDay[] },
): Promise<BuyFrame> {
	const now = page.now ?? askClock()
	const zone = producer.timeZone
	const base = `/buy/${producer.slug}/${store.slug}`
	const today = dayInZone(now, zone)
	const fortnight =
		page.fortnight ??
		(await findFortnight({
			producerId: producer.id,
			storeId: store.id,
			now,
			zone,
			...(page.day ? { day: page.day } : {}),
		}))
	return {
		masthead: {
			homeHref: `${base}/sheet`,
			who: store.name,
			place: `ordering from ${producer.name}`,
			now: `${dayWords(today)}, ${timeWords(now, zone)}`,
			person: { name: person.name, href: "/account", signOutAction: "/sign-out" },
		},
		ribbon: ribbonOf({ base, fortnight, today, zone, chosen: page.part === "sheet" ? page.day : undefined }),
		tabs: PARTS.map(([part, label]) => ({ to: `${base}/${part}`, label, current: part === page.part })),
	}
}

function ribbonOf(facts: {
	base: string
	fortnight: readonly FortnightDay[]
	today: Day
	zone: string
	chosen: Day | undefined
}): BuyFrame["ribbon"] {
	const { base, fortnight, today, zone, chosen } = facts
	const from = fortnight[0]?.on ?? today
	const deliveries = fortnight.filter((day) => day.delivery)
	const isTodays = daysBetween(today, from) === 0
	return {
		label: "Delivery days in two weeks",
		days: fortnight.map((day) => ribbonDay({ base, day, today, chosen })),
		threads: threadsOf(deliveries, from, zone),
		...(isTodays ? {} : { earlierHref: `${base}/sheet?from=${addDays(from, -14)}` }),
		laterHref: `${base}/sheet?from=${addDays(from, 14)}`,
	}
}

function ribbonDay(facts: { base: string; day: FortnightDay; today: Day; chosen: Day | undefined }): RibbonDay {
	const { base, day, today, chosen } = facts
	const { on, delivery, freeCases, ownCases } = day
	const isOpen = delivery?.isOpen === true
	const caption = ownCases > 0 ? `you ask ${ownCases}` : isOpen ? `${freeCases} free` : undefined
	return {
		on,
		href: delivery ? `${base}/sheet/${on}` : `${base}/sheet?from=${on}`,
		weekday: weekdayName(weekday(on)),
		dayOfMonth: Number(on.slice(8)),
		isToday: on === today,
		chosen: on === chosen,
		quiet: !delivery && on !== today,
		...(delivery ? { kind: "delivery" as const, closed: !isOpen } : {}),
		...(isOpen ? { bar: { promised: ownCases, free: freeCases } } : {}),
		...(caption ? { caption } : {}),
	}
}

const MS_PER_DAY = 86_400_000
/** A label needs so many days of width to be written out. */
const WIDE_THREAD_DAYS = 3

/** Ties each cut-off to its delivery: from its own hour to the middle of the day it closes. */
export function threadsOf(
	deliveries: readonly Pick<FortnightDay, "on" | "delivery">[],
	from: Day,
	zone: string,
): CutoffThread[] {
	return deliveries.flatMap(({ on, delivery }) => {
		if (!delivery) return []
		const cutoffOn = dayInZone(delivery.cutoffAt, zone)
		const index = daysBetween(from, on)
		const fromDay = daysBetween(from, cutoffOn) + hourShare(delivery.cutoffAt, zone)
		const isWide = index - fromDay > WIDE_THREAD_DAYS
		const closes = `${weekdayName(weekday(cutoffOn)).slice(0, 3)} ${timeWords(delivery.cutoffAt, zone)}`
		const label = isWide
			? `${closes}: last orders for ${weekdayName(weekday(on))} ${Number(on.slice(8))}`
			: `${closes}: for ${shortDay(on)}`
		// A hair's breadth between the end of one thread and the start of the next.
		return { fromDay: fromDay + 0.08, toDay: index + 0.46, label }
	})
}

/** Which part of the day has passed at `instant` by the clocks of `zone`: 0.5 at noon, also when the clocks change. */
function hourShare(instant: Date, zone: string): number {
	const text = instant.toLocaleTimeString("en-GB", { timeZone: zone, hour: "2-digit", minute: "2-digit" })
	const [hours = 0, minutes = 0] = text.split(":").map(Number)
	return ((hours * 60 + minutes) * 60_000) / MS_PER_DAY
}
