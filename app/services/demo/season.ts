import { addDays, type Day, weekday } from "~/domain/calendar"
import { type DeliveryDay, isOpen, nextDeliveryDays } from "~/domain/delivery/delivery-days"
import type { Chance } from "./chance"
import type { DemoScenario } from "./scenario"

/** What every part of the demo is made from: whose it is, what day it is, and the delivery days around it. */
export type Season = {
	scenario: DemoScenario
	producerId: string
	now: Date
	today: Day
	chance: Chance
	/** The id of the person with this mail address. Throws for one who is not in the demo. */
	userId: (email: string) => string
	days: SeasonDays
}

export type SeasonDays = {
	shut: { on: Day; reason: string }[]
	/** Delivery days up to and with today, the earliest first. */
	past: DeliveryDay[]
	/** The next day whose orders are made up; the first open one where the last has gone out already. */
	closed: DeliveryDay
	/** Delivery days whose orders are still taken. */
	open: DeliveryDay[]
}

/** Sorts the delivery days of the season by what can still be done about them. */
export function seasonDays(scenario: DemoScenario, today: Day, now: Date): SeasonDays {
	const lastRound = scenario.rounds.at(-1)
	const toLastRound = lastRound ? (lastRound.weekday - weekday(today) + 7) % 7 : 0
	const shut = [
		{ on: addDays(today, toLastRound - 49), reason: "Van at the garage" },
		{ on: addDays(today, toLastRound + 35), reason: "Stock-taking" },
	]
	const days = nextDeliveryDays({
		rounds: scenario.rounds,
		shutDays: shut.map((day) => day.on),
		zone: scenario.timeZone,
		from: addDays(today, -7 * scenario.seasonWeeks),
		count: scenario.rounds.length * (scenario.seasonWeeks + 6),
	})
	const open = days.filter((day) => isOpen(day, now))
	const gone = days.filter((day) => !isOpen(day, now))
	const lastGone = gone.at(-1)
	const next = open[0]
	if (!next) throw new Error("a producer with rounds has days to come")
	return {
		shut,
		past: gone.filter((day) => day.on <= today),
		closed: lastGone && lastGone.on >= today ? lastGone : next,
		open,
	}
}

/** `at`, or now where that is still to come: nothing in the demo has happened in the future. */
export function notAfter(now: Date, at: Date): Date {
	return at.getTime() > now.getTime() ? now : at
}

/** `at` moved by so many minutes. */
export function minutesAfter(at: Date, minutes: number): Date {
	return new Date(at.getTime() + minutes * 60_000)
}

/** The entry of `map` under `key`. Throws where a scenario names something that it does not have. */
export function named<T>(map: ReadonlyMap<string, T>, key: string): T {
	const entry = map.get(key)
	if (entry === undefined) throw new Error(`the demo has no "${key}"`)
	return entry
}

/** The entries of `list` by what `keyOf` says of them, in the order in which each key first came. */
export function grouped<Key, T>(list: readonly T[], keyOf: (entry: T) => Key): Map<Key, T[]> {
	const groups = new Map<Key, T[]>()
	for (const entry of list) {
		const key = keyOf(entry)
		groups.set(key, [...(groups.get(key) ?? []), entry])
	}
	return groups
}
