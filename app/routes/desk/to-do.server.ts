import {
	type Day,
	dayInZone,
	daysBetween,
	dayWords,
	instantAt,
	monthDay,
	shortDay,
	timeWords,
	weekday,
	weekdayName,
} from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { lineAmount } from "~/domain/pricing/weighed-line"
import { casesWords } from "~/domain/quantity"
import type { OpenOrder } from "~/services/desk/find-open-orders.server"
import type { HeldLot, OverdueInvoice, PackingDay, ToDo, WaitingDay } from "~/services/desk/find-to-do.server"
import type { Shortage } from "~/services/desk/shortages.server"
import { counted, countHead, countWords } from "~/ui/desk/number-words"
import type { OwedRow, ToDoGroup, ToDoRow } from "~/ui/desk/to-do-rows"
import type { StripRun } from "~/ui/stock/strip-geometry"

type Moment = { now: Date; zone: string; today: Day; base: string }

/** A row, when its group is named, and where it stands among the others. */
type Placed = { when: string; at: string; order: number; row: ToDoRow; note?: string }

/** The rows of the To do page in words, in groups by when they close. */
export function toDoGroups(toDo: Omit<ToDo, "settled" | "overdue">, moment: Moment): ToDoGroup[] {
	const placed = [
		...toDo.waiting.map((day) => confirmRow(day, moment)),
		...toDo.packing.map((day) => packingRow(day, moment)),
		...toDo.heldLots.map((lot) => lotRow(lot, moment)),
		...toDo.shortages.map((shortage) => shortRow(shortage, moment)),
		...storeRows(toDo, moment),
	].toSorted((a, b) => (a.at === b.at ? a.order - b.order : a.at < b.at ? -1 : 1))
	const groups: ToDoGroup[] = []
	for (const { when, row, note } of placed) {
		const group = groups.find((one) => one.when === when)
		if (group) {
			group.rows.push(row)
			group.note ??= note
		} else groups.push({ when, rows: [row], ...(note ? { note } : {}) })
	}
	return groups
}

/** Stands behind all that has a day. */
const LAST = { when: "From stores", at: "9999" }

/** What stores wait for an answer to, and what is to look at about them. */
function storeRows(
	{ reports, toLookAt, differences }: Pick<ToDo, "reports" | "toLookAt" | "differences">,
	moment: Moment,
) {
	const { base } = moment
	const rows: Placed[] = [
		...reports.map((report) => ({
			...LAST,
			order: 4,
			row: {
				key: `broken ${report.id}`,
				name: `${report.storeName} reports ${report.pieces} broken ${report.pieces === 1 ? "piece" : "pieces"}`,
				line: `On invoice ${report.invoiceNumber}.`,
				link: {
					to: `${base}/breakage/${report.id}`,
					label: "Answer",
					about: `${report.storeName}, invoice ${report.invoiceNumber}`,
				},
			},
		})),
		...toLookAt.map((one) => ({ ...LAST, order: 5, row: lookAtRow(one, moment) })),
	]
	if (differences > 0) {
		rows.push({
			when: "Money",
			at: "99999",
			order: 6,
			row: {
				key: "differences",
				name: `${counted(differences, "payment")} ${differences === 1 ? "stands" : "stand"} otherwise at Stripe`,
				line: "The nightly look found something other there than here.",
				link: { to: `${base}/stripe-differences`, label: "Look", about: "differences from Stripe" },
			},
		})
	}
	return rows
}

function lookAtRow(
	{ kind, storeSlug, storeName, on, amountCents }: ToDo["toLookAt"][number],
	{ base }: Moment,
): ToDoRow {
	const [name, line] =
		kind === "certificate-waits"
			? [`${storeName} has handed in a resale certificate`, `By itself it would hold until ${monthDay(on)}.`]
			: kind === "certificate-ends"
				? [`The certificate of ${storeName} runs out`, `It holds until ${monthDay(on)}; the store has been written to.`]
				: [
						`${storeName} promised to pay by ${monthDay(on)}`,
						`${formatMoney(amountCents ?? 0)}; say whether it was kept.`,
					]
	return {
		key: `${kind} ${storeSlug} ${on}`,
		name,
		line,
		link: { to: `${base}/stores/${storeSlug}`, label: "Open the store", about: storeName },
	}
}

/** The invoices past their day, in words. */
export function owedRows(overdue: readonly OverdueInvoice[], { today, base }: Moment): OwedRow[] {
	return overdue.map(({ number, storeName, dueOn, openCents }) => {
		const late = daysBetween(dueOn, today)
		return {
			number,
			storeName,
			to: `${base}/invoices/${number}`,
			due: monthDay(dueOn),
			late: late === 1 ? "1 day late" : `${late} days late`,
			money: formatMoney(openCents),
		}
	})
}

/** The packing rows alone, for a packer. */
export function packingGroups(packing: PackingDay[], moment: Moment): ToDoGroup[] {
	return toDoGroups(
		{ waiting: [], packing, heldLots: [], shortages: [], reports: [], toLookAt: [], differences: 0 },
		moment,
	)
}

/** "Before noon tomorrow", "Before noon on Wednesday"; an instant that has passed is "Orders closed". */
function beforeWords(cutoffAt: Date, { now, zone, today }: Moment): string {
	if (cutoffAt <= now) return "Orders closed"
	return `Before ${timeWords(cutoffAt, zone)} ${nearDay(dayInZone(cutoffAt, zone), today, "on ")}`
}

/** "today", "tomorrow", "Wednesday", "August 28"; `on` stands before a name. */
function nearDay(on: Day, today: Day, before = ""): string {
	const ahead = daysBetween(today, on)
	if (ahead === 0) return "today"
	if (ahead === 1) return "tomorrow"
	return `${before}${ahead > 0 && ahead < 7 ? weekdayName(weekday(on)) : monthDay(on)}`
}

/** "Tuesday" for a day of this week, "Tuesday 25" for a later one. */
function deliveryName(on: Day, today: Day): string {
	const ahead = daysBetween(today, on)
	if (ahead === 0) return "today"
	const name = weekdayName(weekday(on))
	return ahead > 0 && ahead < 7 ? name : `${name} ${Number(on.slice(8))}`
}

/** So many orders of a day stand below its row; the others are a link away. */
const MOST_SHOWN = 25

/** The dearest first; of two alike the one placed first. */
const byMoney = (orders: WaitingDay["orders"]) => orders.toSorted((a, b) => sureCents(b.order) - sureCents(a.order))

function confirmRow({ deliveryOn, cutoffAt, orders }: WaitingDay, moment: Moment): Placed {
	const { today, base, now } = moment
	const whole = orders.filter((one) => one.isWhole).length
	const rest = orders.length - whole
	const met = whole === 0 ? "" : `${countHead(whole)} can be met now`
	const waits = rest === 0 ? "" : `${countWords(rest)} cannot be met in full`
	const line =
		met && waits
			? `${met}; ${waits}.`
			: met
				? orders.length === 1
					? "It can be met now."
					: "All can be met now."
				: orders.length === 1
					? "It cannot be met in full."
					: "None can be met in full."
	const isOpen = cutoffAt !== null && cutoffAt > now
	return {
		when: cutoffAt ? beforeWords(cutoffAt, moment) : "Orders closed",
		at: (isOpen ? cutoffAt : now).toISOString(),
		order: 0,
		note: isOpen
			? `Orders for ${deliveryName(deliveryOn, today)} close ${nearDay(dayInZone(cutoffAt, moment.zone), today, "on ")} at ${timeWords(cutoffAt, moment.zone)}. Stores told now can still change the rest.`
			: undefined,
		row: {
			key: `confirm ${deliveryOn}`,
			name: `Confirm ${counted(orders.length, "order")} for ${deliveryName(deliveryOn, today)}`,
			line,
			...(whole > 1
				? {
						confirmAll: {
							day: deliveryOn,
							label: whole === orders.length ? `Confirm all ${countWords(whole)}` : `Confirm the ${countWords(whole)}`,
						},
					}
				: {}),
			...(orders.length > MOST_SHOWN
				? {
						rest: {
							to: `${base}/orders?day=${deliveryOn}&state=placed`,
							label: `All ${orders.length.toLocaleString("en-US")} orders of ${deliveryName(deliveryOn, today)}`,
						},
					}
				: {}),
			orders: byMoney(orders)
				.slice(0, MOST_SHOWN)
				.map(({ order, isWhole }) => ({
					number: order.number,
					storeName: order.storeName,
					to: `${base}/orders/${order.number}`,
					line: askedWords(order),
					money: formatMoney(sureCents(order)),
					isWhole,
				})),
		},
	}
}

const isOpenShare = (line: OpenOrder["lines"][number]) => line.isToShare && line.givenCases === null

/** What is sure of a line: given where that is decided, else asked; while it is to be shared out, what is promised. */
const sureCases = (line: OpenOrder["lines"][number]) =>
	line.givenCases ?? (line.isToShare ? line.promisedCases : line.askedCases)

function sureCents({ lines, deliveryCents }: OpenOrder): number {
	return lines.reduce((sum, line) => sum + lineAmount({ ...line, cases: sureCases(line) }).cents, deliveryCents)
}

/** "5 cases, and 4 of basswood section to be shared out". */
function askedWords({ lines }: OpenOrder): string {
	const cases = lines.reduce((sum, line) => sum + sureCases(line), 0)
	const shared = lines
		.filter(isOpenShare)
		.map((line) => `${line.askedCases - line.promisedCases} of ${line.productName.toLowerCase()}`)
	if (shared.length === 0) return casesWords(cases)
	const rest = `${shared.join(", ")} to be shared out`
	return cases === 0 ? rest : `${casesWords(cases)}, and ${rest}`
}

function packingRow(day: PackingDay, { today, zone, base }: Moment): Placed {
	const { deliveryOn, orders, packedOrders, cases, packedCases } = day
	const isAllPacked = packedOrders === orders
	const ahead = daysBetween(today, deliveryOn)
	const name =
		ahead < 0
			? `the round of ${monthDay(deliveryOn)}`
			: ahead === 0
				? "today’s round"
				: ahead === 1
					? "tomorrow’s round"
					: `the round of ${shortDay(deliveryOn)}`
	const runs: StripRun[] = [
		{ state: "free", count: packedCases },
		{ state: "promised", count: cases - packedCases },
	]
	return {
		when: ahead <= 1 ? "Today" : `For ${nearDay(deliveryOn, today)}`,
		at: instantAt(ahead <= 1 ? today : deliveryOn, "00:00", zone).toISOString(),
		order: 1,
		row: {
			key: `pack ${deliveryOn}`,
			name: isAllPacked ? `Send off ${name}` : `Pack for ${name}`,
			line: `${countHead(orders)} ${orders === 1 ? "stop" : "stops"}, ${casesWords(cases)}.`,
			strip: { runs, caption: `${packedCases} of ${casesWords(cases)} packed` },
			link: {
				to: `${base}/packing?day=${deliveryOn}`,
				label: "Packing sheet",
				icon: "printer",
				about: `for ${dayWords(deliveryOn)}`,
			},
		},
	}
}

function lotRow(lot: HeldLot, { today, zone, base }: Moment): Placed {
	const ahead = daysBetween(today, lot.expectedReleaseOn)
	const due = ahead < 0 ? `was due ${monthDay(lot.expectedReleaseOn)}` : `due ${nearDay(lot.expectedReleaseOn, today)}`
	return {
		when: ahead <= 0 ? "Today" : `By ${nearDay(lot.expectedReleaseOn, today)}`,
		at: instantAt(ahead <= 0 ? today : lot.expectedReleaseOn, "00:00", zone).toISOString(),
		order: 2,
		row: {
			key: `lot ${lot.code}`,
			name: `Lot ${lot.code} is held: ${lot.productName.toLowerCase()}`,
			line: `Its release is ${due}.`,
			strip: {
				runs: [{ state: "held", count: lot.cases }],
				caption: lot.cases > 0 ? `${casesWords(lot.cases)} held` : `${lot.pieces} pieces held`,
			},
			link: { to: `${base}/lots/${lot.code}`, label: "See the lot", about: lot.code },
		},
	}
}

function shortRow(shortage: Shortage, { today, zone, base }: Moment): Placed {
	const { productName, deliveryOn, shortCases, strip, toShareCases, stores, overPromisedCases } = shortage
	const asked =
		toShareCases > 0
			? `${countHead(stores)} ${stores === 1 ? "store asks" : "stores ask"} for ${toShareCases}; ${strip.freeCases} can be ready.`
			: `${casesWords(overPromisedCases)} promised beyond what is there.`
	const runs: StripRun[] = [
		{ state: "free", count: strip.free },
		{ state: "held", count: strip.held },
		{ state: "expected", count: strip.expected },
		{ state: "short", count: shortCases },
	]
	return {
		when: `By ${nearDay(deliveryOn, today)}`,
		at: instantAt(deliveryOn, "00:00", zone).toISOString(),
		order: 3,
		row: {
			key: `short ${deliveryOn} ${productName}`,
			name: `${productName}: ${shortCases} short ${deliveryName(deliveryOn, today)}`,
			line: asked,
			strip: { runs, caption: `${strip.freeCases} can be ready`, short: `${shortCases} short` },
			link: {
				to: `${base}/sharing/${encodeURIComponent(shortage.productCode)}/${deliveryOn}`,
				label: "Share out",
				about: `${productName}, ${dayWords(deliveryOn)}`,
			},
		},
	}
}
