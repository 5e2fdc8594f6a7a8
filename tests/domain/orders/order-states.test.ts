import { describe, expect, test } from "vitest"
import { canMove, checkMove, holdsPromise, isOpenToChange, nextStates, orderStates } from "~/domain/orders/order-states"
import { producerRoles, type Role, storeRoles } from "~/domain/people/roles"

const everyone: Role[] = [...producerRoles, ...storeRoles]

describe("the way of an order", () => {
	test("an order goes step by step from placed to received, and no step is skipped or taken back", () => {
		const steps = orderStates.flatMap((from) => nextStates(from).map((to) => `${from} to ${to}`))
		expect(steps).toEqual([
			"placed to confirmed",
			"placed to cancelled",
			"confirmed to packed",
			"confirmed to cancelled",
			"packed to sent",
			"packed to cancelled",
			"sent to received",
		])
	})

	test("what is received or cancelled stays so", () => {
		expect(nextStates("received")).toEqual([])
		expect(nextStates("cancelled")).toEqual([])
		for (const state of orderStates) expect(canMove(state, state)).toBe(false)
	})

	test.each([
		["placed", "confirmed", ["owner", "desk"]],
		["placed", "cancelled", ["owner", "desk", "buyer", "payer"]],
		["confirmed", "packed", ["owner", "desk", "packer"]],
		["confirmed", "cancelled", ["owner", "desk"]],
		["packed", "sent", ["owner", "desk", "packer"]],
		["packed", "cancelled", ["owner", "desk"]],
		["sent", "received", ["owner", "desk", "packer", "buyer", "payer"]],
	] as const)("from %s to %s: %j may, everyone else may not", (from, to, allowed) => {
		for (const role of everyone) {
			const isAllowed = (allowed as readonly Role[]).includes(role)
			expect(checkMove({ from, to, role })).toEqual(isAllowed ? { ok: true } : { ok: false, reason: "not-yours" })
		}
	})

	test("a step that does not exist is refused to everyone, the owner too", () => {
		for (const role of everyone) {
			expect(checkMove({ from: "sent", to: "cancelled", role })).toEqual({ ok: false, reason: "no-such-step" })
			expect(checkMove({ from: "placed", to: "sent", role })).toEqual({ ok: false, reason: "no-such-step" })
		}
	})

	test("goods are promised until they have gone or the order is cancelled", () => {
		expect(orderStates.filter(holdsPromise)).toEqual(["placed", "confirmed", "packed"])
	})

	test("a store changes its order while it is placed, and until last orders, not at them", () => {
		const cutoffAt = new Date("2026-08-14T16:00:00Z")
		const before = new Date("2026-08-14T15:59:59Z")
		expect(isOpenToChange("placed", cutoffAt, before)).toBe(true)
		expect(isOpenToChange("placed", cutoffAt, cutoffAt)).toBe(false)
		expect(isOpenToChange("confirmed", cutoffAt, before)).toBe(false)
	})
})
