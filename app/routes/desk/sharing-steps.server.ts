import { randomUUID } from "node:crypto"
import { data } from "react-router"
import { dayInZone, isDay, shortMonthDay, timeWords, weekday, weekdayName } from "~/domain/calendar"
import { casesWords } from "~/domain/quantity"
import { now as askClock } from "~/platform/clock.server"
import { findSharing, type SharingRun } from "~/services/sharing/find-sharing.server"
import { claimsOf, type SharingFacts } from "~/services/sharing/read-sharing.server"
import { setWeights } from "~/services/sharing/set-weights.server"
import { type SharedOut, shareOutProduct } from "~/services/sharing/share-out-product.server"
import { type UndoingSharing, undoSharing } from "~/services/sharing/undo-sharing.server"
import { handName } from "~/ui/sharing/hand-fields"
import { SHARING_RULES, type ShareRow } from "~/ui/sharing/told-rules"
import { weightName } from "~/ui/sharing/weights-form"
import type { DeskScope } from "../guard.server"
import { handProblems, readSharingForm, readWeights } from "./sharing-form"

type Params = { product: string; day: string }
type Found = { facts: SharingFacts; run: SharingRun | null }

/** What is to be shared of the product and day of an address; 404 unless both are there. */
export async function sharingOf({ producer }: DeskScope, params: Params): Promise<Found> {
	if (!isDay(params.day)) throw data(null, { status: 404 })
	const today = dayInZone(askClock(), producer.timeZone)
	const query = { producerId: producer.id, productCode: params.product, deliveryOn: params.day, today }
	const found = await findSharing(query)
	if (!found) throw data(null, { status: 404 })
	return found
}

const ruleOf = Object.fromEntries(SHARING_RULES.map((rule) => [rule, rule])) as Record<
	string,
	(typeof SHARING_RULES)[number]
>

/** All that the page shows, the largest asking first. */
export function readSharingPage({ facts, run }: Found, { url, scope }: { url: URL; scope: DeskScope }) {
	const { product, supply, seen } = facts
	const sorted = facts.rows.toSorted((a, b) => b.askedCases - a.askedCases || a.orderNumber - b.orderNumber)
	const rows = sorted.map((row) => shownRow(row, facts))
	const zone = scope.producer.timeZone
	return {
		productName: product.name,
		note: noteOf(facts),
		rows,
		claims: claimsOf(sorted),
		supply,
		seen,
		rule: ruleOf[url.searchParams.get("rule") ?? ""] ?? "equal-shares",
		ruleOf,
		suppose: (url.searchParams.get("suppose") ?? "").slice(0, 40),
		idempotencyKey: randomUUID(),
		names: Object.fromEntries(
			rows.flatMap((row) => [
				[handName(row.lineId), row.storeName],
				[weightName(row.storeId), row.storeName],
			]),
		),
		weighed: [...new Map(rows.map((row) => [row.storeId, row])).values()],
		maySetWeights: scope.roles.includes("owner"),
		run: run && {
			...run,
			when: `${shortMonthDay(dayInZone(run.sharedAt, zone))}, ${timeWords(run.sharedAt, zone)} by ${run.sharedBy}`,
		},
	}
}

function shownRow(row: SharingFacts["rows"][number], facts: SharingFacts): ShareRow {
	const { lineId, storeId, storeName, orderNumber, askedCases, sureCases, leastCases, weightPercent, last } = row
	return {
		...{ lineId, storeId, storeName, orderNumber, askedCases, sureCases, leastCases, weightPercent },
		last: last && { asked: last.asked, given: last.given, when: shortMonthDay(last.on) },
		instead: row.substituteIds.flatMap((id) => facts.substitutes.find(({ productId }) => productId === id) ?? []),
	}
}

function noteOf({ product, later, isOverPromised }: SharingFacts): string {
	const name = [product.name, product.detail].filter(Boolean).join(", ")
	const over = isOverPromised ? " More is promised than will be there, so all that is not confirmed yet shares." : ""
	if (!later || later.cases === 0) return `${name}.${over}`
	const when = `${weekdayName(weekday(later.on))}, ${shortMonthDay(later.on)}`
	return `${name}. ${casesWords(later.cases)} more may come on ${when}, too late for this day.${over}`
}

type Taken =
	| { ok: true; done: string }
	| { ok: false; status: number; errors: Record<string, string>; values: Record<string, string> }

/** Takes the step that a form of the page asks for. Throws 400 for a step there is none of. */
export async function takeSharingStep(query: { form: FormData; params: Params; scope: DeskScope }): Promise<Taken> {
	switch (query.form.get("intent")) {
		case "share":
			return share(query)
		case "undo":
			return undo(query)
		case "weights":
			return weigh(query)
		default:
			throw data(null, { status: 400 })
	}
}

async function share({ form, params, scope }: { form: FormData; params: Params; scope: DeskScope }): Promise<Taken> {
	await sharingOf(scope, params)
	const { values, errors, decision, byHand, instead, note } = readSharingForm(form)
	if (!decision) throw data(null, { status: 400 })
	if (Object.keys(errors).length > 0) return { ok: false, status: 422, errors, values }
	const answer = await shareOutProduct({
		producer: scope.producer,
		productCode: params.product,
		deliveryOn: params.day,
		personId: scope.person.id,
		...decision,
		byHand,
		instead,
		note,
	})
	if (answer.ok) return { ok: true, done: "shared" }
	return { ok: false, ...shareProblem(answer), values }
}

function shareProblem(answer: Extract<SharedOut, { ok: false }>): { status: number; errors: Record<string, string> } {
	switch (answer.reason) {
		case "no-such-product":
			throw data(null, { status: 404 })
		case "nothing-to-share":
			return { status: 409, errors: { "": "It has been shared out or settled meanwhile." } }
		case "changed":
			return {
				status: 409,
				errors: { "": "What is asked or what can be ready has changed. Here it is as it stands now; look again." },
			}
		case "more-than-free":
			return {
				status: 422,
				errors: { "": `That gives ${casesWords(answer.given)}; only ${answer.supply} can be ready.` },
			}
		case "lines":
			return { status: 422, errors: handProblems(answer.refused) }
	}
}

async function undo({ form, scope }: { form: FormData; scope: DeskScope }): Promise<Taken> {
	const runId = String(form.get("run") ?? "")
	if (!/^[0-9a-f-]{36}$/.test(runId)) throw data(null, { status: 400 })
	const answer = await undoSharing({ producerId: scope.producer.id, runId, personId: scope.person.id })
	if (answer.ok) return { ok: true, done: "undone" }
	return { ok: false, status: 422, errors: { "": undoProblem(answer) }, values: {} }
}

function undoProblem(answer: Extract<UndoingSharing, { ok: false }>): string {
	switch (answer.reason) {
		case "no-such-run":
			throw data(null, { status: 404 })
		case "undone-already":
			return "It has been taken back already."
		case "already-told":
			return "A letter has gone, so it stands. A change from here on is a new decision."
		case "order-decided":
			return `Order ${answer.orderNumber} is confirmed or cancelled already; take that back first.`
	}
}

/** Only the owner says how much a store counts. */
async function weigh({ form, params, scope }: { form: FormData; params: Params; scope: DeskScope }): Promise<Taken> {
	if (!scope.roles.includes("owner")) throw data(null, { status: 403 })
	const { facts } = await sharingOf(scope, params)
	const storeIds = [...new Set(facts.rows.map(({ storeId }) => storeId))]
	const { weights, errors, values } = readWeights(form, storeIds)
	if (Object.keys(errors).length > 0) return { ok: false, status: 422, errors, values }
	await setWeights({ producerId: scope.producer.id, personId: scope.person.id, weights })
	return { ok: true, done: "weighed" }
}
