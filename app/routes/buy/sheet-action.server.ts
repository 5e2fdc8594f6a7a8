import { randomUUID } from "node:crypto"
import { data, redirect } from "react-router"
import { z } from "zod"
import { type Day, dayInZone } from "~/domain/calendar"
import type { UnmatchedRow } from "~/domain/orders/read-columns"
import { now as askClock } from "~/platform/clock.server"
import { changeOrder } from "~/services/orders/change-order.server"
import type { LineRefusal } from "~/services/orders/check-asked.server"
import { findDaysWithCases } from "~/services/orders/find-days-with-cases.server"
import { findSheetProducts } from "~/services/orders/find-sheet-products.server"
import { dropDraft, keepDraft } from "~/services/orders/keep-draft.server"
import { placeOrder } from "~/services/orders/place-order.server"
import type { StoreScope } from "../guard.server"
import { numberIn } from "./sheet.server"
import { type PostedSheet, readSheet, textFields } from "./sheet-form"
import { fillFromList, mendRows } from "./sheet-list.server"
import { refusalWords, type SheetErrors } from "./sheet-words"

/** The sheet as it was posted, to be shown again. `fill` is another whenever the fields begin with something else. */
type SheetAnswer = {
	fill: string
	values: Record<string, string>
	errors: SheetErrors
	idempotencyKey: string
	unmatched: UnmatchedRow[]
	/** Days that have what this one has not, by product. */
	elsewhere: Record<string, Day[]>
	/** A field for the least of every line. */
	showsLeast: boolean
	/** What was done, in a sentence, where nothing is wrong. */
	told: string
}

type Posted = { scope: StoreScope; day: Day; form: FormData; url: URL; now: Date }

/** Answers a posted sheet: sends it, or does what its other buttons say. */
export async function answerSheet(posted: Omit<Posted, "now">) {
	const query = { ...posted, now: askClock() }
	switch (posted.form.get("intent")) {
		case "keep":
			await keepSheet(query)
			return shown(textFields(query.form), { told: "Kept. It is here when you come back, on any device." })
		case "keep-quietly":
			await keepSheet(query)
			return data(null)
		case "afresh":
			await dropDraft(storeDay(query))
			throw redirect(posted.url.pathname)
		case "list":
			return putListIn(query)
		case "mend":
			return mendSheet(query)
		case "least":
			return shown(textFields(posted.form), { showsLeast: true })
		case "carry":
			return shown(withoutChoices(textFields(posted.form)), {
				told: "This is what you wrote for the other day. Nothing is ordered yet.",
			})
		default:
			return sendSheet(query)
	}
}

const storeDay = ({ scope, day }: Posted) => ({
	producerId: scope.producer.id,
	storeId: scope.store.id,
	deliveryOn: day,
})

function shown(values: Record<string, string>, more: Partial<SheetAnswer> = {}, status = 200) {
	const answer: SheetAnswer = {
		fill: randomUUID(),
		values,
		errors: {},
		idempotencyKey: values.idempotencyKey ?? randomUUID(),
		unmatched: mendRows(values, []).unmatched,
		elsewhere: {},
		showsLeast: values.showsLeast !== undefined,
		told: "",
		...more,
	}
	return data(answer, { status })
}

/** What was chosen about one day's short lines says nothing about another's. */
function withoutChoices(values: Record<string, string>): Record<string, string> {
	return Object.fromEntries(Object.entries(values).filter(([name]) => !name.startsWith("keep-")))
}

async function keepSheet(query: Posted): Promise<void> {
	const values = textFields(query.form)
	const idempotencyKey = z.uuid().safeParse(values.idempotencyKey).data
	if (!idempotencyKey) throw data(null, { status: 400 })
	await keepDraft({ ...storeDay(query), personId: query.scope.person.id, now: query.now, values, idempotencyKey })
}

async function putListIn(query: Posted) {
	const products = await findSheetProducts({ ...storeDay(query), now: query.now, zone: query.scope.producer.timeZone })
	const before = textFields(query.form)
	const { values, unmatched, errors } = await fillFromList(query.form, before, products)
	const isWrong = Object.keys(errors).length > 0
	const told = isWrong ? "" : "The list is in the sheet. Look through it; nothing is ordered yet."
	return shown(values, { unmatched, errors, told }, isWrong ? 422 : 200)
}

async function mendSheet(query: Posted) {
	const products = await findSheetProducts({ ...storeDay(query), now: query.now, zone: query.scope.producer.timeZone })
	const { values, unmatched } = mendRows(textFields(query.form), products)
	return shown(values, { unmatched, told: unmatched.length === 0 ? "Every row of the list has its place." : "" })
}

/** Rows of a list without a place are not passed over in silence: the sheet is sent once each is put in or left out. */
async function holdForRows(query: Posted, posted: PostedSheet) {
	if (posted.values["mend-0"] === undefined) return null
	const products = await findSheetProducts({ ...storeDay(query), now: query.now, zone: query.scope.producer.timeZone })
	const { values, unmatched, putIn } = mendRows(posted.values, products)
	if (unmatched.length === 0 && putIn === 0) return null
	const words =
		unmatched.length === 0
			? "Rows of your list were put in just now. Look through the sheet, then send it."
			: "Rows of your list have no product yet. Choose one for each, or leave it out."
	return shown(values, { unmatched, errors: { "": words } }, 422)
}

async function sendSheet(query: Posted) {
	const { scope, day, now, url } = query
	const { producer, store, person } = scope
	const posted = readSheet(query.form)
	if (!posted) throw data(null, { status: 400 })
	if (Object.keys(posted.errors).length > 0) return shown(posted.values, { errors: posted.errors }, 422)
	const held = await holdForRows(query, posted)
	if (held) return held

	const zone = producer.timeZone
	const { lines, poNumber, note, idempotencyKey } = posted
	const sheet = { producerId: producer.id, storeId: store.id, person, zone, now, lines, poNumber, note, idempotencyKey }
	const number = numberIn(url.searchParams, "order")
	const answer =
		number === null ? await placeOrder({ ...sheet, deliveryOn: day }) : await changeOrder({ ...sheet, number })
	const done = number === null ? "sent" : "changed"
	if (answer.ok) throw redirect(`/buy/${producer.slug}/${store.slug}/orders/${answer.number}?${done}`)
	const errors = refusalWords(answer, { posted, zone, today: dayInZone(now, zone) })
	const elsewhere = answer.reason === "lines" && number === null ? await otherDays(query, posted, answer.refused) : {}
	return shown(posted.values, { errors, elsewhere }, 422)
}

async function otherDays({ scope, day, now }: Posted, posted: PostedSheet, refused: readonly LineRefusal[]) {
	const short = refused.filter((line) => line.reason === "more-than-free").map((line) => line.productId)
	if (short.length === 0) return {}
	const days = await findDaysWithCases({
		producerId: scope.producer.id,
		storeId: scope.store.id,
		now,
		zone: scope.producer.timeZone,
		except: day,
		asked: posted.lines.filter((line) => short.includes(line.productId)),
	})
	return Object.fromEntries(days)
}
