import { data } from "react-router"
import { z } from "zod"
import { writeMessage } from "~/services/messages/write-message.server"
import { takeBackProposal } from "~/services/orders/answer-proposal.server"
import { cancelFromDesk } from "~/services/orders/cancel-from-desk.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import type { DeskOrder } from "~/services/orders/find-desk-order.server"
import { findProposal } from "~/services/orders/find-proposal.server"
import { markReceived } from "~/services/orders/mark-received.server"
import { packOrder } from "~/services/orders/pack-order.server"
import { proposeChange } from "~/services/orders/propose-change.server"
import { sendOrder } from "~/services/orders/send-order.server"
import { undoConfirmation } from "~/services/orders/undo-confirmation.server"
import type { DeskScope } from "../guard.server"
import { readConfirmation } from "./confirm-form"
import { readLateChange } from "./order-change-form"
import { readMessage } from "./order-message"
import { lineProblem, orderProblem } from "./order-words"

type Refused = { errors: Record<string, string>; values: Record<string, string> }
type Step = { ok: true; done: string } | { ok: false; status: number; refused: Refused }

/** Takes the step that a form of the order page asks for. Throws 400 for a step there is none of. */
export async function takeStep(query: { form: FormData; order: DeskOrder; scope: DeskScope }): Promise<Step> {
	const { form, order, scope } = query
	const { producer, person } = scope
	const step = { producerId: producer.id, number: order.number, personId: person.id }
	switch (form.get("intent")) {
		case "confirm":
			return confirm(query)
		case "undo":
			return answered(order.number, "undone", await undoConfirmation({ ...step, producer }))
		case "pack":
			return answered(order.number, "packed", await packOrder(step))
		case "send":
			return send(order.number, await sendOrder({ ...step, producer }))
		case "cancel":
			return answered(order.number, "cancelled", await cancelFromDesk(step))
		case "receive":
			return (await markReceived(step))
				? { ok: true, done: "received" }
				: refuse({ "": `Order ${order.number} is not on its way. Nothing was changed.` })
		case "propose":
			return propose(query)
		case "take-back": {
			const proposalId = z.guid().safeParse(form.get("proposal"))
			if (!proposalId.success) throw data(null, { status: 400 })
			const taken = { ...step, producer, proposalId: proposalId.data }
			return answered(order.number, "taken-back", await takeBackProposal(taken))
		}
		case "write":
			return write(query)
		default:
			throw data(null, { status: 400 })
	}
}

function send(number: number, sent: Awaited<ReturnType<typeof sendOrder>>): Step {
	const isMonthly = sent.ok && sent.invoiceNumber === null
	return answered(number, isMonthly ? "sent-for-month" : "sent", sent)
}

async function confirm({ form, order, scope }: { form: FormData; order: DeskOrder; scope: DeskScope }): Promise<Step> {
	const posted = readConfirmation(form, order.lines)
	if (Object.keys(posted.errors).length > 0) return refuse(posted.errors, posted.values)
	const answer = await confirmOrder({
		producer: scope.producer,
		number: order.number,
		personId: scope.person.id,
		given: posted.given,
	})
	if (answer.ok) return { ok: true, done: "confirmed" }
	if (answer.reason !== "lines") return answered(order.number, "confirmed", answer, posted.values)
	const wrong = answer.refused.map((line) => [`given-${line.lineId}`, lineProblem(line)])
	return refuse(Object.fromEntries(wrong), posted.values)
}

type Asked = { form: FormData; order: DeskOrder; scope: DeskScope }

/** A late change: proposed or applied, which the page then says. */
async function propose({ form, order, scope }: Asked): Promise<Step> {
	const { lines } = await findProposal({ producerId: scope.producer.id, number: order.number })
	const posted = readLateChange(form, lines)
	if (Object.keys(posted.errors).length > 0) return refuse(posted.errors, posted.values)
	const { reason, changes } = posted
	const about = { producer: scope.producer, number: order.number, personId: scope.person.id }
	const answer = await proposeChange({ ...about, reason, changes })
	if (answer.ok) return { ok: true, done: answer.outcome }
	if (answer.reason !== "change-lines") return answered(order.number, "asked", answer, posted.values)
	const wrong = answer.refused.map((line) => [`cases-${line.lineId}`, lineProblem(line)])
	return refuse(Object.fromEntries(wrong), posted.values)
}

async function write({ form, order, scope }: Asked): Promise<Step> {
	const read = readMessage(form)
	if (!read.ok) return refuse(read.errors, read.values)
	const { producer, person } = scope
	const writer = { side: "desk" as const, person }
	const about = { producer, number: order.number, writer, idempotencyKey: read.key }
	const written = await writeMessage({ ...about, body: read.body })
	if (written.ok) return { ok: true, done: "written" }
	return refuse({ "": "Open the page again and send it from there." }, { body: read.body })
}

type Answer = { ok: true } | ({ ok: false } & Parameters<typeof orderProblem>[1])

function answered(number: number, done: string, answer: Answer, values: Record<string, string> = {}): Step {
	if (answer.ok) return { ok: true, done }
	if (answer.reason === "no-such-order") throw data(null, { status: 404 })
	return refuse({ "": orderProblem(number, answer) }, values)
}

function refuse(errors: Record<string, string>, values: Record<string, string> = {}): Step {
	return { ok: false, status: 422, refused: { errors, values } }
}
