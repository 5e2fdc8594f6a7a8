import { describe, expect, test } from "vitest"
import { letterKindOf, letterKinds, whoIsTold } from "~/domain/people/letters"
import { templates } from "~emails/templates"

const rosa = { name: "Rosa", lettersOff: [] as string[] }
const sam = { name: "Sam", lettersOff: ["messages", "invoices", "reminders"] }

describe("the letters that a store's people want", () => {
	test("each person is told only what they have not switched off", () => {
		expect(whoIsTold([rosa, sam], "messages")).toEqual([rosa])
		expect(whoIsTold([rosa, sam], "confirmations")).toEqual([rosa, sam])
	})

	test("when nobody at the store wants a kind it goes to all of them, so that somebody knows", () => {
		const both = [sam, { name: "Ann", lettersOff: ["invoices"] }]
		expect(whoIsTold(both, "invoices")).toEqual(both)
	})

	test("reminders that nobody wants stay away", () => {
		expect(whoIsTold([sam], "reminders")).toEqual([])
	})

	test("a store without people is no trouble", () => {
		for (const kind of letterKinds) expect(whoIsTold([], kind)).toEqual([])
	})

	test("signing in, invitations and withdrawals cannot be switched off", () => {
		for (const name of ["sign-in-code", "sign-in-unknown", "invitation", "withdrawal"]) {
			expect(Object.keys(templates)).toContain(name)
			expect(letterKindOf(name)).toBeNull()
		}
	})

	test("confirmations, shortages, changes, messages and invoices are each of the kind the page names", () => {
		expect(letterKindOf("order-confirmed")).toBe("confirmations")
		expect(letterKindOf("order-shared")).toBe("confirmations")
		expect(letterKindOf("order-proposal")).toBe("changes")
		expect(letterKindOf("order-message")).toBe("messages")
		expect(letterKindOf("invoice")).toBe("invoices")
		expect(letterKindOf("toString")).toBeNull()
	})
})
