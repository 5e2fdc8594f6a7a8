import { data } from "react-router"
import { z } from "zod"
import { writeMessage } from "~/services/messages/write-message.server"
import { answerProposal } from "~/services/orders/answer-proposal.server"
import { cancelOrder } from "~/services/orders/cancel-order.server"
import { readMessage } from "../desk/order-message"
import { orderProblem } from "../desk/order-words"
import type { StoreScope } from "../guard.server"

/** Why a step was refused: words for the head of the page, or words beside fields with what was typed. */
type Refused = { title: string; problem: string | null; errors: Record<string, string>; body: string }
type Step = { ok: true; search: string } | { ok: false; refused: Refused }
type Asked = {
	form: FormData
	scope: StoreScope
	query: { producerId: string; storeId: string; number: number; now: Date; zone: string }
}

/** Takes the step that a form of a store's order page asks for. Throws 400 for a step there is none of. */
export async function takeStep(asked: Asked): Promise<Step> {
	switch (asked.form.get("intent")) {
		case "cancel":
			return cancel(asked)
		case "accept":
			return answer(asked, "accepted")
		case "decline":
			return answer(asked, "declined")
		case "write":
			return write(asked)
		default:
			throw data(null, { status: 400 })
	}
}

async function cancel({ scope, query }: Asked): Promise<Step> {
	const cancelled = await cancelOrder({ ...query, personId: scope.person.id })
	if (cancelled.ok) return { ok: true, search: "cancelled" }
	if (cancelled.reason === "unknown") throw data(null, { status: 404 })
	const { state } = cancelled
	return refuse(
		"The order could not be cancelled.",
		state === "placed" ? "Last orders for this delivery have passed." : `It is ${state} already.`,
	)
}

async function answer({ form, scope, query }: Asked, choice: "accepted" | "declined"): Promise<Step> {
	const proposalId = z.guid().safeParse(form.get("proposal"))
	if (!proposalId.success) throw data(null, { status: 400 })
	const { producer, store, person } = scope
	const about = { producer, storeId: store.id, number: query.number, proposalId: proposalId.data }
	const answered = await answerProposal({ ...about, person, answer: choice })
	if (answered.ok) return { ok: true, search: `answered=${choice}` }
	if (answered.reason === "no-such-order") throw data(null, { status: 404 })
	return refuse("The change was not answered.", orderProblem(query.number, answered))
}

async function write({ form, scope, query }: Asked): Promise<Step> {
	const read = readMessage(form)
	if (!read.ok) {
		const refused = { title: "The message was not sent", problem: null, errors: read.errors, body: read.values.body }
		return { ok: false, refused }
	}
	const { producer, store, person } = scope
	const writer = { side: "store" as const, storeId: store.id, person }
	const about = { producer, number: query.number, writer, idempotencyKey: read.key }
	const written = await writeMessage({ ...about, body: read.body })
	if (written.ok) return { ok: true, search: "written" }
	if (written.reason === "no-such-order") throw data(null, { status: 404 })
	return refuse("The message was not sent.", "Open the page again and send it from there.", read.body)
}

function refuse(title: string, problem: string, body = ""): Step {
	return { ok: false, refused: { title, problem, errors: {}, body } }
}
