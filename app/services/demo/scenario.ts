import type { products, stores } from "~/db/schema"
import type { Weekday } from "~/domain/calendar"
import type { ProducerRole, StoreRole } from "~/domain/people/roles"

/** Who is what at the producer; people are named by their mail address. */
export type DemoMember = { email: string } & ({ role: ProducerRole } | { role: StoreRole; store: string })

/** A product of the price list. Cents and cases; `casePrices` are those of the first tier for the three breaks. */
export type DemoProduct = {
	code: string
	name: string
	form: (typeof products.$inferInsert)["form"]
	grade: string
	flora: string
	colour: "straw" | "light" | "amber" | "dark"
	detail: string
	netOunces: number
	piecesPerCase: number
	breakFamily: string
	casePrices: readonly [number, number, number]
	pieceCents: number | null
	reservePieces: number
	/** The letter of its lots, and the yard they come from. */
	lotLetter: string
	yard: string
	/** Pieces in one harvest. */
	harvestPieces: number
	/** Cases that are free for the coming delivery day, on released stock. */
	freeCases: number
	/** A lot that is held, in cases, and how many days until its release is expected. */
	held?: { cases: number; inDays: number }
}

/** A standing order of a store; `weeks` apart, on the first weekday of its rounds. */
export type DemoStanding = {
	weeks: 1 | 2
	lines: readonly { code: string; cases: number; least: number }[]
	/** Dates ahead that the store skips, counted from the next one. */
	skips: readonly number[]
	/** Set for an order that was stopped some weeks ago. */
	hasEnded?: boolean
}

/** A store and how it orders and pays. */
export type DemoStore = {
	slug: string
	name: string
	tier: string
	address: string
	receivingNote: string
	minimumCents: number
	deliveryChargeCents: number
	freeAboveCents: number | null
	termsKind: NonNullable<(typeof stores.$inferInsert)["termsKind"]>
	termsDays: number
	discount?: { basisPoints: number; days: number }
	hasCertificate: boolean
	/** Weekdays of the rounds that stop here. */
	rounds: readonly Weekday[]
	/** In how many of 100 rounds it orders, and the most cases of one product. */
	ordersPercent: number
	mostCases: number
	paysBy: "card" | "cheque" | "cash" | "transfer"
	/** Days after the due day on which it pays; negative: before. */
	paysLateDays: number
	standing?: DemoStanding
	/** What it had last: shown beside the order sheet. */
	lastOrder?: readonly { code: string; cases: number }[]
}

/** A market of every week; `weekdayAhead` counts from today, so that 0 is a market today. */
export type DemoMarket = {
	name: string
	address: string
	opensAt: string
	closesAt: string
	readerId: string
	weekdayAhead: number
	/** Volunteers of every day of this market. */
	people: readonly string[]
	/** Pieces loaded out on a usual day, by product code. */
	load: Readonly<Record<string, number>>
}

/** An order of the days to come that is named here and not left to chance. */
export type DemoComingOrder = {
	store: string
	/** Counted among the delivery days whose orders are still open; -1 is the day before, whose orders are made up. */
	openDay: number
	state: "placed" | "confirmed" | "packed" | "cancelled"
	lines: readonly { code: string; cases: number; least?: number; isToShare?: boolean; given?: number }[]
	hoursAgo: number
	note?: string
	poNumber?: string
}

/** What was seen when a super was last looked into, in pieces; capped ones are full too. */
export type DemoLook = { daysAgo: number; full: number; capped: number; isDrawn?: boolean; note?: string }

/**
 * A super on its hive now; without a look where it was only just set on. `readyAfterDays` sets the pace at which it was
 * capped, so that it should be ready so many days after the coming delivery day.
 */
export type DemoSuper = {
	code: string
	setDaysAgo: number
	looked?: DemoLook
	readyAfterDays?: number
	escapeDaysAgo?: number
}

/** A place with hives, each a stack of supers with the undermost first. Hives are counted on from yard to yard. */
export type DemoYard = { name: string; flora: string; hives: readonly (readonly DemoSuper[])[] }

/** All that is told of one producer; `seed-demo.server.ts` makes rows of it. */
export type DemoScenario = {
	seed: number
	slug: string
	name: string
	county: string
	timeZone: string
	settings: {
		address: string
		email: string
		phone: string
		shopHeadline: string
		shopWords: string
		invoiceNote: string
		contactName: string
	}
	/** The first is what `casePrices` are given in; others stand to it in hundredths. */
	tiers: readonly { name: string; percent: number }[]
	products: readonly DemoProduct[]
	rounds: readonly { name: string; weekday: Weekday; cutoffDaysBefore: number; cutoffTime: string }[]
	stores: readonly DemoStore[]
	yards: readonly DemoYard[]
	members: readonly DemoMember[]
	/** Whoever enters orders for stores without a buyer of their own, and does the rest at the desk. */
	deskEmail: string
	ownerEmail: string
	packerEmail: string
	invitations: readonly ({ email: string; name: string; wasAccepted: boolean } & (
		| { role: ProducerRole }
		| { role: StoreRole; store: string }
	))[]
	markets: readonly DemoMarket[]
	comingOrders: readonly DemoComingOrder[]
	/** How long the season has run. */
	seasonWeeks: number
	marketWeeks: number
}
