import { addDays, type Day, dayInZone, daysBetween, dayWords, timeWords, weekday, weekdayName } from "~/domain/calendar"
import { mayManagePeople, mayRunDesk } from "~/domain/people/roles"
import { now as askClock } from "~/platform/clock.server"
import { type DeskDay, findDeskFortnight } from "~/services/desk/find-desk-fortnight.server"
import type { MastheadProps } from "~/ui/layout/masthead"
import type { FortnightRibbonProps, RibbonDay } from "~/ui/layout/ribbon"
import type { Tab } from "~/ui/layout/thumb-index"
import { threadsOf } from "../buy/frame.server"
import type { DeskScope } from "../guard.server"

type Roles = DeskScope["roles"]

/** The parts of the desk, as the thumb index names them, and who has them. */
const PARTS = [
	["", "To do", () => true],
	["orders", "Orders", (roles: Roles) => roles.some(mayRunDesk)],
	["sharing", "Sharing", (roles: Roles) => roles.some(mayRunDesk)],
	["packing", "Packing", () => true],
	["lots", "Lots", () => true],
	["crop", "Crop", () => true],
	["invoices", "Invoices", (roles: Roles) => roles.some(mayRunDesk)],
	["stores", "Stores", (roles: Roles) => roles.some(mayRunDesk)],
	["prices", "Prices", (roles: Roles) => roles.some(mayRunDesk)],
	["people", "People", (roles: Roles) => roles.some(mayManagePeople)],
] as const

type DeskPart = (typeof PARTS)[number][0]

/** What every page of the desk shows around its sheet. */
export type DeskFrame = { masthead: MastheadProps; ribbon: FortnightRibbonProps; tabs: Tab[] }

/**
 * The frame of a desk page: the producer, who and when, the fortnight with what it holds, the parts of the desk that the
 * person's roles open. `day` is the day the page is about and is the chosen one; `from` turns the ribbon to another
 * fortnight.
 */
export async function findDeskFrame(
	{ producer, person, roles }: DeskScope,
	page: { part: DeskPart; day?: Day; from?: Day; toSettle?: number; now?: Date },
): Promise<DeskFrame> {
	const now = page.now ?? askClock()
	const zone = producer.timeZone
	const base = `/desk/${producer.slug}`
	const today = dayInZone(now, zone)
	const shown = page.from ?? page.day
	const fortnight = await findDeskFortnight({ producerId: producer.id, now, zone, ...(shown ? { day: shown } : {}) })
	const from = fortnight[0]?.on ?? today
	const seesOrders = roles.some(mayRunDesk)
	return {
		masthead: {
			homeHref: base,
			who: producer.name,
			now: `${dayWords(today)}, ${timeWords(now, zone)}`,
			person: { name: person.name, href: "/account", signOutAction: "/sign-out" },
		},
		ribbon: {
			label: "Two weeks",
			days: fortnight.map((day) => ({
				...ribbonDay(day, { today, toSettle: page.toSettle }),
				href: day.on === today ? base : `${base}/${seesOrders ? "orders" : "packing"}?day=${day.on}`,
				chosen: day.on === (page.day ?? (page.part === "" && !page.from ? today : undefined)),
			})),
			threads: threadsOf(
				fortnight.filter((day) => day.delivery),
				from,
				zone,
			),
			...(daysBetween(today, from) === 0 ? {} : { earlierHref: `${base}?from=${addDays(from, -14)}` }),
			laterHref: `${base}?from=${addDays(from, 14)}`,
		},
		tabs: PARTS.filter(([, , isOpenTo]) => isOpenTo(roles)).map(([part, label]) => ({
			to: part === "" ? base : `${base}/${part}`,
			label,
			current: part === page.part,
		})),
	}
}

function ribbonDay(
	day: DeskDay,
	facts: { today: Day; toSettle: number | undefined },
): Omit<RibbonDay, "href" | "chosen"> {
	const { on, delivery, marketName, promisedCases, freeCases, shortCases, expectedCases } = day
	const isToday = on === facts.today
	const base = {
		on,
		weekday: weekdayName(weekday(on)),
		dayOfMonth: Number(on.slice(8)),
		isToday,
		quiet: !isToday && !delivery && !marketName && expectedCases === 0,
	}
	const settle = isToday && facts.toSettle ? { caption: `${facts.toSettle} to settle` } : {}
	if (delivery) {
		const isShort = shortCases > 0
		const all = promisedCases + freeCases
		return {
			...base,
			kind: "delivery",
			bar: { promised: promisedCases, free: freeCases, short: shortCases },
			caption: isShort ? `${shortCases} short` : `${promisedCases} of ${all}`,
			captionIsShort: isShort,
			...settle,
		}
	}
	if (marketName) return { ...base, kind: "market", ...settle }
	if (expectedCases > 0) {
		return { ...base, kind: "off-hives", bar: { expected: expectedCases }, caption: `${expectedCases} due`, ...settle }
	}
	return { ...base, ...settle }
}
