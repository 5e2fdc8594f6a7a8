import { expect, test } from "vitest"
import {
	isStoreRole,
	mayChangeSettings,
	mayManagePeople,
	mayOrder,
	mayPack,
	mayPay,
	mayRunDesk,
	maySellOn,
	producerRoles,
	type Role,
	storeRoles,
} from "~/domain/people/roles"

const everyone: Role[] = [...producerRoles, ...storeRoles]
const who = (may: (role: Role) => boolean) => everyone.filter(may)

test("the owner and the desk run the desk, and only the owner changes settings and people", () => {
	expect(who(mayRunDesk)).toEqual(["owner", "desk"])
	expect(who(mayChangeSettings)).toEqual(["owner"])
	expect(who(mayManagePeople)).toEqual(["owner"])
})

test("the cold room is for packers and those who run the desk", () => {
	expect(who(mayPack)).toEqual(["owner", "desk", "packer"])
})

test("a volunteer sells only on a day they are named on", () => {
	expect(who((role) => maySellOn(role, true))).toEqual(["owner", "stall"])
	expect(who((role) => maySellOn(role, false))).toEqual(["owner"])
})

test("a buyer orders, a payer orders and pays, and nobody at the producer does either", () => {
	expect(who(mayOrder)).toEqual(["buyer", "payer"])
	expect(who(mayPay)).toEqual(["payer"])
	expect(who(isStoreRole)).toEqual(["buyer", "payer"])
})
