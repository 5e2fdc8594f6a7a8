import { type Day, daysBetween } from "~/domain/calendar"
import { wholeCases } from "~/domain/quantity"
import { type Advice, adviseOn, isUnseen } from "./advice"
import { type ExpectedPieces, mondayOf, readyDay } from "./forecast"
import { isReady, latestCheck, type SuperCheck, type SuperFacts } from "./super-facts"

/** Which figure of the crop the producer counts as supply. */
export type CropFigure = "low" | "likely"

/** A hive with the supers that are on it, as the database has them. */
export type HiveFacts = {
	id: string
	label: string
	yard: { id: string; name: string; flora: string }
	supers: readonly (SuperFacts & { id: string; productName: string; level: number })[]
}

/** A super as the board draws it. */
export type BoardSuper = {
	id: string
	productName: string
	/** Place in the stack; 1 is next to the brood. */
	level: number
	capacityPieces: number
	latest: SuperCheck | null
	/** The bee escape is in. */
	isClearing: boolean
	isReady: boolean
	isUnseen: boolean
	readyOn: Day
	advice: Advice[]
}

/** A hive of the board; its supers from the top of the stack down. */
export type BoardHive = { id: string; label: string; supers: BoardSuper[] }
export type BoardYard = { id: string; name: string; flora: string; hives: BoardHive[] }

/** Hives in the order given, gathered by yard, each super with its day and what its checks suggest. */
export function layBoard(hives: readonly HiveFacts[], facts: { today: Day; readyCappedPercent: number }): BoardYard[] {
	const yards = new Map<string, BoardYard>()
	for (const { id, label, yard, supers } of hives) {
		const board = yards.get(yard.id) ?? { ...yard, hives: [] }
		yards.set(yard.id, board)
		const stack = supers.toSorted((a, b) => b.level - a.level)
		// The super set on last is the one beside which the next is given; of two of one day, the upper one.
		const last = stack.toSorted((a, b) => daysBetween(a.setOn, b.setOn) || b.level - a.level)[0]
		board.hives.push({
			id,
			label,
			supers: stack.map((one) => boardSuper(one, { ...facts, isLastOnHive: one === last })),
		})
	}
	return [...yards.values()]
}

function boardSuper(
	one: HiveFacts["supers"][number],
	facts: { today: Day; readyCappedPercent: number; isLastOnHive: boolean },
): BoardSuper {
	return {
		id: one.id,
		productName: one.productName,
		level: one.level,
		capacityPieces: one.capacityPieces,
		latest: latestCheck(one),
		isClearing: one.state === "clearing",
		isReady: isReady(one, facts.readyCappedPercent),
		isUnseen: isUnseen(one, facts.today),
		readyOn: readyDay(one, facts),
		advice: adviseOn(one, facts),
	}
}

/** Pieces of a product expected on a day, with how many make a case. */
export type ExpectedDay = ExpectedPieces & { productId: string; on: Day; piecesPerCase: number }

/** Whole cases expected in the week that begins on Monday `on`; `days` at the figure that counts, by the day a case comes full. */
export type CropWeek = ExpectedPieces & { on: Day; days: { on: Day; cases: number }[] }

/**
 * Cases by week over all products, the earliest first. Pieces of a product are gathered over the week and make whole cases,
 * rounded down: what does not fill a case cannot be promised to a store.
 */
export function weeksOf(expected: readonly ExpectedDay[], figure: CropFigure): CropWeek[] {
	const weeks = [...new Set(expected.map(({ on }) => mondayOf(on)))].sort()
	return weeks.map((monday) => {
		const ofWeek = expected.filter(({ on }) => mondayOf(on) === monday)
		const days = [...new Set(ofWeek.map(({ on }) => on))].sort()
		return {
			on: monday,
			low: casesOf(ofWeek, "low"),
			likely: casesOf(ofWeek, "likely"),
			high: casesOf(ofWeek, "high"),
			days: days.flatMap((on) => {
				// The cases that come full on this day: those of the days together are those of the week.
				const until = (isCounted: (day: Day) => boolean) =>
					casesOf(
						ofWeek.filter((one) => isCounted(one.on)),
						figure,
					)
				const cases = until((day) => day <= on) - until((day) => day < on)
				return cases > 0 ? { on, cases } : []
			}),
		}
	})
}

function casesOf(expected: readonly ExpectedDay[], figure: keyof ExpectedPieces): number {
	const pieces = new Map<string, { pieces: number; piecesPerCase: number }>()
	for (const { productId, piecesPerCase, ...day } of expected) {
		pieces.set(productId, { pieces: (pieces.get(productId)?.pieces ?? 0) + day[figure], piecesPerCase })
	}
	return [...pieces.values()].reduce((sum, one) => sum + wholeCases(one.pieces, one.piecesPerCase), 0)
}

/** What open orders ask of a product, and what of it is in stock, held or released; in pieces. */
export type AskedProduct = { productId: string; piecesPerCase: number; askedPieces: number; stockPieces: number }

/**
 * The cases that are asked for and not in stock, each product rounded up to whole cases, and the Monday of the first week
 * by the end of which the hives have brought all of them at the figure that counts; null when they do not, or when
 * nothing is lacking.
 */
export function lackingCases(
	asked: readonly AskedProduct[],
	expected: readonly ExpectedDay[],
	figure: CropFigure,
): { cases: number; coveredIn: Day | null } {
	const lacking = asked.flatMap((one) => {
		const pieces = one.askedPieces - one.stockPieces
		return pieces > 0 ? { ...one, pieces } : []
	})
	const cases = lacking.reduce((sum, one) => sum + Math.ceil(one.pieces / one.piecesPerCase), 0)
	const weeks = lacking.map(({ productId, pieces }) => {
		let still = pieces
		const ofProduct = expected.filter((day) => day.productId === productId)
		const last = ofProduct
			.toSorted((a, b) => daysBetween(b.on, a.on))
			.find((day) => {
				still -= day[figure]
				return still <= 0
			})
		return last ? mondayOf(last.on) : null
	})
	const isCovered = weeks.length > 0 && !weeks.includes(null)
	return { cases, coveredIn: isCovered ? (weeks.toSorted().at(-1) ?? null) : null }
}
