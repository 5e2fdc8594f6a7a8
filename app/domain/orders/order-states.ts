import { isStoreRole, mayOrder, mayPack, mayRunDesk, type Role } from "~/domain/people/roles"
import type { Result } from "~/domain/result"

/** The states of an order, in the order it goes through them; cancelled stands apart. */
export const orderStates = ["placed", "confirmed", "packed", "sent", "received", "cancelled"] as const
export type OrderState = (typeof orderStates)[number]

const STEPS: Record<OrderState, Partial<Record<OrderState, (role: Role) => boolean>>> = {
	placed: { confirmed: mayRunDesk, cancelled: (role) => mayRunDesk(role) || mayOrder(role) },
	confirmed: { packed: mayPack, cancelled: mayRunDesk },
	packed: { sent: mayPack, cancelled: mayRunDesk },
	sent: { received: (role) => mayPack(role) || isStoreRole(role) },
	received: {},
	cancelled: {},
}

/** Whether an order in `from` may become `to`, whoever does it. */
export function canMove(from: OrderState, to: OrderState): boolean {
	return STEPS[from][to] !== undefined
}

/**
 * Whether `role` may take an order from one state to another. A store cancels only while the order is placed (and, by the
 * cut-off, only in time); the desk cancels until it is sent; packers pack and send; who takes it in may be noted by the
 * store or by whoever delivers. Refuses with `no-such-step` before it looks at the role, then with `not-yours`.
 * This product's own rule.
 */
export function checkMove(move: {
	from: OrderState
	to: OrderState
	role: Role
}): Result<object, { ok: false; reason: "no-such-step" | "not-yours" }> {
	const isAllowed = STEPS[move.from][move.to]
	if (!isAllowed) return { ok: false, reason: "no-such-step" }
	return isAllowed(move.role) ? { ok: true } : { ok: false, reason: "not-yours" }
}

/** The states an order in `from` can still go to, in the order of the list. */
export function nextStates(from: OrderState): OrderState[] {
	return orderStates.filter((to) => canMove(from, to))
}

/** Whether goods of an order in this state are still promised and not yet gone: what free to promise must keep. */
export function holdsPromise(state: OrderState): boolean {
	return state === "placed" || state === "confirmed" || state === "packed"
}

/** Whether a store may still change the lines itself: while placed and before last orders. */
export function isOpenToChange(state: OrderState, cutoffAt: Date, now: Date): boolean {
	return state === "placed" && now.getTime() < cutoffAt.getTime()
}
