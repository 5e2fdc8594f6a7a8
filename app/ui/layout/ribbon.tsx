import { type KeyboardEvent, useEffect, useRef } from "react"
import { Link, useNavigate } from "react-router"
import { Icon, type IconName } from "~/ui/icons"
import { DayBar, type DayStock, dayBarScale } from "~/ui/stock/day-bar"
import { type CutoffThread, CutoffThreads } from "./cutoff-threads"

type DayKind = "delivery" | "market" | "off-hives"

export type RibbonDay = {
	/** ISO day, "2026-08-18". */
	on: string
	href: string
	/** In full; three letters of it are shown. */
	weekday: string
	dayOfMonth: number
	isToday: boolean
	kind?: DayKind
	bar?: DayStock
	/** One caption at most: "23 of 40", "6 to settle". */
	caption?: string
	captionIsShort?: boolean
	/** Past its cut-off. */
	closed?: boolean
	chosen: boolean
	/** Nothing is on. */
	quiet: boolean
	status?: "ready" | "waiting" | "not-known"
}

const KINDS: Record<DayKind, { label: string; icon?: IconName }> = {
	delivery: { label: "Delivery", icon: "delivery" },
	market: { label: "Market", icon: "market" },
	"off-hives": { label: "Off hives" },
}

function Day({ day, scale }: { day: RibbonDay; scale: number }) {
	const kind = day.kind && KINDS[day.kind]
	const status = day.status ?? "ready"
	const caption = status === "not-known" ? "not known" : (day.caption ?? (day.closed ? "closed" : undefined))
	return (
		<li className={["ribbon-day", day.chosen && "chosen", day.quiet && "quiet"].filter(Boolean).join(" ")}>
			<Link
				to={day.href}
				data-day={day.on}
				data-today={day.isToday || undefined}
				aria-current={day.chosen ? "date" : undefined}
			>
				<time className="day-date" dateTime={day.on}>
					<abbr title={day.weekday}>{day.isToday && kind ? "Today" : day.weekday.slice(0, 3)}</abbr>{" "}
					<b>{day.dayOfMonth}</b>
				</time>
				{status === "waiting" ? (
					<>
						<span className="day-waiting" />
						<span className="day-waiting" />
					</>
				) : (
					<>
						{(kind || day.isToday) && (
							<span className="day-kind">
								{kind?.icon && <Icon name={kind.icon} size={14} />}
								{kind?.label ?? "Today"}
							</span>
						)}
						{day.bar && status === "ready" && <DayBar {...day.bar} scale={scale} />}
						{caption && (
							<span className={day.captionIsShort || status === "not-known" ? "day-caption short" : "day-caption"}>
								{caption}
							</span>
						)}
					</>
				)}
			</Link>
		</li>
	)
}

export type FortnightRibbonProps = {
	label?: string
	days: readonly RibbonDay[]
	threads?: readonly CutoffThread[]
	earlierHref?: string
	laterHref?: string
}

/**
 * Time as the first navigation: choose the day, see where it will be tight. The day is in the address of the page. Left and
 * right walk the days, Home goes to today, Page Up and Page Down to the fortnights before and after.
 */
export function FortnightRibbon({
	label = "Next 14 days",
	days,
	threads = [],
	earlierHref,
	laterHref,
}: FortnightRibbonProps) {
	const ribbon = useRef<HTMLElement>(null)
	const navigate = useNavigate()
	const scale = dayBarScale(days.map((day) => day.bar ?? {}))
	const chosenOn = days.find((day) => day.chosen)?.on

	useEffect(() => {
		const chosen = ribbon.current?.querySelector<HTMLElement>(`[data-day="${chosenOn}"]`)
		// Which of the two boxes scrolls depends on the width; setting the other changes nothing.
		for (const box of [ribbon.current, ribbon.current?.querySelector(".ribbon-scroll")]) {
			if (box && chosen) box.scrollLeft = chosen.offsetLeft
		}
	}, [chosenOn])

	const walk = (event: KeyboardEvent<HTMLElement>) => {
		if (event.altKey || event.ctrlKey || event.metaKey) return
		const links = [...event.currentTarget.querySelectorAll<HTMLElement>("[data-day]")]
		const at = links.indexOf(document.activeElement as HTMLElement)
		if (at < 0) return
		const turnTo = event.key === "PageUp" ? earlierHref : event.key === "PageDown" ? laterHref : undefined
		const goal =
			event.key === "ArrowLeft"
				? links[at - 1]
				: event.key === "ArrowRight"
					? links[at + 1]
					: event.key === "Home"
						? links.find((link) => link.dataset.today)
						: undefined
		if (!goal && !turnTo) return
		event.preventDefault()
		goal?.focus()
		if (turnTo) navigate(turnTo)
	}

	return (
		<nav className="ribbon" aria-label={label} ref={ribbon} onKeyDown={walk}>
			<div className="ribbon-scroll">
				<div className="ribbon-track">
					{threads.length > 0 && <CutoffThreads threads={threads} dayCount={days.length} />}
					<ol className="ribbon-days">
						{days.map((day) => (
							<Day key={day.on} day={day} scale={scale} />
						))}
					</ol>
				</div>
			</div>
			{(earlierHref || laterHref) && (
				<div className="ribbon-turn">
					{earlierHref && (
						<Link to={earlierHref} aria-label="Two weeks earlier">
							<Icon name="left" />
						</Link>
					)}
					{laterHref && (
						<Link to={laterHref} aria-label="Two weeks later">
							<Icon name="right" />
						</Link>
					)}
				</div>
			)}
		</nav>
	)
}
