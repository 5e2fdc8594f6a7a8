import { type Day, fullDay, shortMonthDay } from "~/domain/calendar"
import type { OrderState } from "~/domain/orders/order-states"

/** How an order stands, as its store reads it. */
export function stateWords(state: OrderState, producerName: string): string {
	const words: Record<OrderState, string> = {
		placed: `waiting for ${producerName} to confirm`,
		confirmed: "confirmed",
		packed: "packed",
		sent: "sent",
		received: "received",
		cancelled: "cancelled",
	}
	return words[state]
}

type EventKind = OrderState | "changed" | "shared" | "proposed" | "answered" | "invoiced" | "paid"

/** What happened, at the head of a line of the timeline. */
export const EVENT_WORDS: Record<EventKind, string> = {
	placed: "Placed",
	changed: "Changed",
	shared: "Shared out",
	proposed: "Change proposed",
	answered: "Change answered",
	confirmed: "Confirmed",
	packed: "Packed",
	sent: "Sent",
	received: "Received",
	cancelled: "Cancelled",
	invoiced: "Invoiced",
	paid: "Paid",
}

/** A delivery day in a list of this year's and earlier ones: "Aug 18", or in full when it is of another year than `today`. */
export function listDay(on: Day, today: Day): string {
	return on.slice(0, 4) === today.slice(0, 4) ? shortMonthDay(on) : fullDay(on)
}
