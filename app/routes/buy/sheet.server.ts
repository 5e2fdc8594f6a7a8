import { randomUUID } from "node:crypto"
import { type Day, dayInZone, isDay, timeLeftWords } from "~/domain/calendar"
import { cutoffSoonWords } from "~/domain/delivery/last-orders"
import { now as askClock } from "~/platform/clock.server"
import { findNextOpenDay, findOrderSheet, type OrderSheet } from "~/services/orders/find-order-sheet.server"
import type { StoreScope } from "../guard.server"
import { findBuyFrame } from "./frame.server"
import { begunWords } from "./sheet-words"

/** What a sheet is begun with. `key` is another whenever the fields begin with something else. */
export type SheetStart = {
	key: string
	values: Record<string, string>
	/** The order that is being changed. */
	changes: number | null
	/** The order that is asked for again. */
	again: number | null
	/** Lines of that order whose product is no longer sold to the store, and which are therefore not on the sheet. */
	gone: number
	/** The half-filled sheet it goes on with: when it was begun, and by whom where that was somebody else. */
	draft: { when: string; by: string | null } | null
}

/** The order number that a search parameter names; null when it names none. */
export function numberIn(search: URLSearchParams, name: string): number | null {
	const text = search.get(name) ?? ""
	return /^[1-9]\d{0,8}$/.test(text) ? Number(text) : null
}

/**
 * What the order sheet of `day` shows. Throws 404 when that is no day, or the van does not come to the store on it, or the
 * address names an order that is not the store's, or one for another day to be changed.
 */
export async function loadSheet(scope: StoreScope, day: Day, search: URLSearchParams) {
	const { producer, store } = scope
	const now = askClock()
	const zone = producer.timeZone
	const query = { producerId: producer.id, storeId: store.id, now, zone }
	const [changes, again] = [numberIn(search, "order"), numberIn(search, "again")]
	const number = changes ?? again
	const named = number === null ? undefined : { number, isChange: changes !== null }
	const sheet = isDay(day) ? await findOrderSheet({ ...query, day, ...(named ? { named } : {}) }) : null
	const isElsewhere = named?.isChange === true && sheet?.named?.deliveryOn !== day
	if (!sheet || (named && !sheet.named) || isElsewhere) throw new Response(null, { status: 404 })
	const { isOpen, cutoffAt } = sheet.day
	const today = dayInZone(now, zone)
	return {
		frame: await findBuyFrame(scope, { part: "sheet", day, now, fortnight: sheet.fortnight }),
		day,
		today,
		isOpen,
		closes: { words: cutoffSoonWords(cutoffAt, zone, today), left: isOpen ? timeLeftWords(now, cutoffAt) : null },
		/** Where what was typed for a closed day can go instead. */
		nextOpenDay: isOpen ? null : await findNextOpenDay(query),
		store: sheet.store,
		producerName: producer.name,
		products: sheet.rows,
		orders: sheet.orders,
		start: startOf(sheet, { day, changes, again, isLast: search.has("last"), personId: scope.person.id, zone, today }),
		idempotencyKey: randomUUID(),
	}
}

type Beginning = {
	day: Day
	changes: number | null
	again: number | null
	isLast: boolean
	personId: string
	zone: string
	today: Day
}

/** What was asked for in the address comes before what was begun; an order is changed without regard to that. */
function startOf(sheet: OrderSheet, { day, changes, again, isLast, ...reader }: Beginning): SheetStart {
	const { named, draft } = sheet
	const sold = new Set(sheet.rows.map((row) => row.productId))
	const gone = named?.lines.filter((line) => !sold.has(line.productId)).length ?? 0
	const blank = { values: {}, changes: null, again: null, gone, draft: null }
	if (named && changes !== null) {
		return { ...blank, key: `${day} order ${changes}`, values: orderValues(named, true), changes }
	}
	if (named && again !== null)
		return { ...blank, key: `${day} again ${again}`, values: orderValues(named, false), again }
	if (isLast) {
		const values = sheet.rows.filter((row) => row.lastCases > 0 && row.mayAsk)
		return {
			...blank,
			key: `${day} last`,
			values: Object.fromEntries(values.map((row) => [`cases-${row.productId}`, `${row.lastCases}`])),
		}
	}
	if (!draft) return { ...blank, key: day }
	return {
		...blank,
		key: `${day} draft`,
		values: draft.fields,
		draft: {
			when: begunWords(draft.at, reader.zone, reader.today),
			by: draft.by.id === reader.personId ? null : draft.by.name,
		},
	}
}

/** The fields of a sheet as an order stands; asked again it has no number and note of the old one. */
function orderValues(named: NonNullable<OrderSheet["named"]>, isChange: boolean): Record<string, string> {
	const lines = named.lines.flatMap((line) => [
		[`cases-${line.productId}`, String(line.askedCases)],
		...(line.leastCases > 0 ? [[`least-${line.productId}`, String(line.leastCases)]] : []),
		...(isChange && line.isToShare ? [[`keep-${line.productId}`, "rest"]] : []),
	])
	return Object.fromEntries(isChange ? [...lines, ["poNumber", named.poNumber], ["note", named.note]] : lines)
}
