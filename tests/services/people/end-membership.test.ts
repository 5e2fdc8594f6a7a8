import { expect, test } from "vitest"
import { endMembership } from "~/services/people/end-membership.server"
import { listPeople } from "~/services/people/list-people.server"
import { addMembership, addProducer, addUser, asOwnerOf } from "./people-rows"

test("a role that is ended is gone from the list, and the audit trail says who ended it", async () => {
	const producer = await addProducer()
	const [owner, packer] = [await addUser("Ida Marsh"), await addUser("Wren Alder")]
	await addMembership(producer.id, owner.id, "owner")
	const membershipId = await addMembership(producer.id, packer.id, "packer")
	expect(await endMembership(producer.id, owner.id, membershipId)).toEqual({ ok: true })
	expect((await listPeople(producer.id)).members.map(({ name }) => name)).toEqual(["Ida Marsh"])
	expect(await endMembership(producer.id, owner.id, membershipId)).toEqual({ ok: false, reason: "not-found" })
	const trail = await asOwnerOf(producer.id, "select user_id, action from audit_entries")
	expect(trail).toEqual([{ user_id: owner.id, action: "role ended" }])
})

test("the last owner stays", async () => {
	const producer = await addProducer()
	const owner = await addUser()
	const membershipId = await addMembership(producer.id, owner.id, "owner")
	expect(await endMembership(producer.id, owner.id, membershipId)).toEqual({ ok: false, reason: "last-owner" })
	expect((await listPeople(producer.id)).members).toHaveLength(1)
})

test("two owners who end one another at the same moment leave one", async () => {
	for (let round = 0; round < 5; round++) {
		const producer = await addProducer()
		const [one, two] = [await addUser(), await addUser()]
		const ofOne = await addMembership(producer.id, one.id, "owner")
		const ofTwo = await addMembership(producer.id, two.id, "owner")
		const answers = await Promise.all([
			endMembership(producer.id, one.id, ofTwo),
			endMembership(producer.id, two.id, ofOne),
		])
		expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
		expect((await listPeople(producer.id)).members).toHaveLength(1)
	}
})

test("a role at another producer is not found", async () => {
	const [producer, other] = [await addProducer(), await addProducer()]
	const [owner, stranger] = [await addUser(), await addUser()]
	await addMembership(producer.id, owner.id, "owner")
	const membershipId = await addMembership(other.id, stranger.id, "packer")
	expect(await endMembership(producer.id, owner.id, membershipId)).toEqual({ ok: false, reason: "not-found" })
	expect((await listPeople(other.id)).members).toHaveLength(1)
})
