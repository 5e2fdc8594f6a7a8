import { FortnightRibbon, type RibbonDay } from "~/ui/layout/ribbon"
import { PartGroup } from "./shown"

const day = (dayOfMonth: number, weekday: string, more: Partial<RibbonDay> = {}): RibbonDay => ({
	on: `2026-08-${dayOfMonth}`,
	href: `?day=2026-08-${dayOfMonth}`,
	weekday,
	dayOfMonth,
	isToday: false,
	chosen: false,
	quiet: false,
	...more,
})

/** Two weeks of August, in every state of a day. */
const EXAMPLE_DAYS: RibbonDay[] = [
	day(13, "Thursday", { isToday: true, caption: "6 to settle" }),
	day(14, "Friday", { kind: "delivery", closed: true }),
	day(15, "Saturday", { kind: "market", bar: { promised: 11, free: 3 }, caption: "11 of 14" }),
	day(16, "Sunday", { quiet: true }),
	day(17, "Monday", { kind: "off-hives", bar: { expected: 14 }, caption: "14 due" }),
	day(18, "Tuesday", {
		kind: "delivery",
		bar: { promised: 49, free: 13, short: 13 },
		caption: "13 short",
		captionIsShort: true,
	}),
	day(19, "Wednesday", { kind: "off-hives", bar: { expected: 22 }, caption: "22 due" }),
	day(20, "Thursday", { chosen: true, kind: "delivery", bar: { promised: 9, free: 40 }, caption: "9 of 49" }),
	day(21, "Friday", {
		kind: "delivery",
		bar: { promised: 28, free: 25, short: 3 },
		caption: "3 short",
		captionIsShort: true,
	}),
	day(22, "Saturday", { kind: "market", bar: { promised: 6, free: 10 }, caption: "6 of 16" }),
	day(23, "Sunday", { quiet: true }),
	day(24, "Monday", { status: "waiting" }),
	day(25, "Tuesday", { kind: "delivery", bar: { promised: 19, free: 39 }, caption: "19 of 58" }),
	day(26, "Wednesday", { kind: "delivery", status: "not-known" }),
]

const EXAMPLE_THREADS = [
	{ fromDay: -1, toDay: 1.5, label: "Fri noon: last orders for Friday 14" },
	{ fromDay: 1.6, toDay: 5.5, label: "Fri noon: last orders for Tuesday 18" },
	{ fromDay: 6.5, toDay: 8.46, label: "Wed noon: for Friday 21" },
	{ fromDay: 8.54, toDay: 12.5, label: "Fri noon: last orders for Tuesday 25" },
]

/** The ribbon with every state that a day can be in. */
export function RibbonParts() {
	return (
		<PartGroup title="Fortnight ribbon">
			<div className="min-w-0 bg-tin">
				<FortnightRibbon label="States of a day" days={EXAMPLE_DAYS} threads={EXAMPLE_THREADS} />
			</div>
			<p className="text-note text-ink-soft">
				Today, past cut-off, market, nothing on, off the hives, short, chosen, waiting, no answer. Left and right walk
				the days, Home is today.
			</p>
		</PartGroup>
	)
}
