import { describe, expect, test } from "vitest"
import { acceptInvitation } from "~/services/people/accept-invitation.server"
import type { Person } from "~/services/people/find-actor.server"
import { findInvitation } from "~/services/people/find-invitation.server"
import { findPlaces } from "~/services/people/find-places.server"
import { type Invited, invitePerson } from "~/services/people/invite-person.server"
import { listPeople } from "~/services/people/list-people.server"
import { withdrawInvitation } from "~/services/people/withdraw-invitation.server"
import { renderMail } from "~emails/render"
import { action as answerInvitation } from "../../../app/routes/auth/invitation"
import { Browser } from "./browser"
import { addMembership, addProducer, addUser, asOwner, asOwnerOf, newestMail, tokenOf } from "./people-rows"
import { signIn, someNetwork } from "./sign-in-steps"

const asPerson = (user: { id: string; name: string; email: string }): Person => ({
	...user,
	sessionId: "",
	lastSeenAt: new Date(),
})

async function addOwner() {
	const producer = await addProducer()
	const owner = await addUser("Ida Marsh")
	await addMembership(producer.id, owner.id, "owner")
	return { producer, owner: asPerson(owner) }
}

const freshAddress = () => `${someNetwork()}@quillandrye.example.test`

/** Letters that wait in the producer's outbox. */
const outbox = (producerId: string) =>
	asOwnerOf<{ recipient: string; template: string; props: { link: string } }>(
		producerId,
		"select recipient, template, props from outbox_mails order by created_at",
	)

/** Invites and answers the token of the letter. */
async function invite(from: Awaited<ReturnType<typeof addOwner>>, invited: Invited): Promise<string> {
	expect(await invitePerson(from.producer, from.owner, invited)).toEqual({ ok: true })
	return tokenOf((await outbox(from.producer.id)).at(-1)?.props.link ?? "")
}

const personAt = async (email: string) => {
	const [user] = await asOwner<{ id: string; name: string; email: string }>(
		"select id, name, email from users where email = $1",
		[email],
	)
	if (!user) throw new Error("no such person")
	return asPerson(user)
}

describe("an invitation", () => {
	test("goes out by a letter that the outbox can write, to the person and for the role", async () => {
		const from = await addOwner()
		const email = freshAddress()
		await invite(from, { email, name: "Rosa Fenn", role: "payer", storeId: from.producer.storeId })
		const [mail] = await outbox(from.producer.id)
		expect(mail).toMatchObject({ recipient: email, template: "invitation" })
		const letter = await renderMail("invitation", mail?.props)
		expect(letter.subject).toBe("Order comb from Larkmoor Bee Yard for Pantry & Plume")
		expect(letter.html).toContain(mail?.props.link)
	})

	test("is accepted once, and gives the role from then on", async () => {
		const from = await addOwner()
		const email = freshAddress()
		const token = await invite(from, { email, name: "Rosa Fenn", role: "buyer", storeId: from.producer.storeId })
		const person = await personAt(email)
		expect(await findPlaces(person.id)).toEqual([])
		expect(await findInvitation(token)).toMatchObject({ email, role: "buyer", storeName: "Pantry & Plume" })
		const answers = await Promise.all([acceptInvitation(token, person), acceptInvitation(token, person)])
		expect(answers.filter(Boolean)).toHaveLength(1)
		expect(await acceptInvitation(token, person)).toBe(false)
		expect(await findInvitation(token)).toBeNull()
		expect((await findPlaces(person.id)).map(({ href }) => href)).toEqual([`/buy/${from.producer.slug}/pantry`])
	})

	test("opens nothing for another than the invited, though they hold the link", async () => {
		const from = await addOwner()
		const token = await invite(from, { email: freshAddress(), name: "Rosa Fenn", role: "owner", storeId: null })
		const thief = asPerson(await addUser())
		expect(await acceptInvitation(token, thief)).toBe(false)
		expect(await findPlaces(thief.id)).toEqual([])
	})

	test("has a code sent to the invited address when nobody is signed in, and comes back after that", async () => {
		const from = await addOwner()
		const email = freshAddress()
		const token = await invite(from, { email, name: "Rosa Fenn", role: "desk", storeId: null })
		const browser = new Browser()
		const post = async () => {
			const request = browser.post(`/invitation/${token}`, {})
			request.headers.set("x-client-address", someNetwork())
			const args = { request, url: new URL(request.url), params: { token } } as Parameters<typeof answerInvitation>[0]
			const answer: unknown = await answerInvitation(args).catch((thrown: unknown) => thrown)
			return answer instanceof Response ? answer.headers.get("location") : answer
		}
		expect(await post()).toBe(`/sign-in/code?${new URLSearchParams({ to: `/invitation/${token}` })}`)
		expect(new URL((await newestMail(email)).link).searchParams.get("to")).toBe(`/invitation/${token}`)
		await signIn(browser, email)
		expect(await post()).toBe(`/desk/${from.producer.slug}`)
	})

	test("is replaced by a newer one to the same role, and can be taken back", async () => {
		const from = await addOwner()
		const invited = { email: freshAddress(), name: "Rosa Fenn", role: "stall", storeId: null } as const
		const first = await invite(from, invited)
		const second = await invite(from, invited)
		const person = await personAt(invited.email)
		expect(await acceptInvitation(first, person)).toBe(false)
		const { waiting } = await listPeople(from.producer.id)
		expect(waiting).toMatchObject([{ email: invited.email, role: "stall" }])
		const id = waiting[0]?.invitationId ?? ""
		expect(await withdrawInvitation(from.producer.id, from.owner.id, id)).toBe(true)
		expect(await withdrawInvitation(from.producer.id, from.owner.id, id)).toBe(false)
		expect(await acceptInvitation(second, person)).toBe(false)
	})

	test("is open for two weeks", async () => {
		const from = await addOwner()
		const email = freshAddress()
		const token = await invite(from, { email, name: "Rosa Fenn", role: "packer", storeId: null })
		const [row] = await asOwnerOf<{ days: number }>(
			from.producer.id,
			"select extract(day from expires_at - created_at)::int as days from invitations where email = $1",
			[email],
		)
		expect(row?.days).toBe(14)
		await asOwnerOf(from.producer.id, "update invitations set expires_at = now() where email = $1", [email])
		expect(await acceptInvitation(token, await personAt(email))).toBe(false)
	})

	test("begins a role again that had ended", async () => {
		const from = await addOwner()
		const user = await addUser()
		await addMembership(from.producer.id, user.id, "packer")
		await asOwnerOf(from.producer.id, "update memberships set ended_at = now() where user_id = $1", [user.id])
		const token = await invite(from, { email: user.email, name: "Rosa Fenn", role: "packer", storeId: null })
		expect(await acceptInvitation(token, asPerson(user))).toBe(true)
		expect((await findPlaces(user.id)).map(({ href }) => href)).toEqual([`/desk/${from.producer.slug}`])
	})

	test("is refused for a store of another producer, and for a role that is held already", async () => {
		const [from, other] = [await addOwner(), await addOwner()]
		const invited = {
			email: freshAddress(),
			name: "Rosa Fenn",
			role: "buyer",
			storeId: other.producer.storeId,
		} as const
		expect(await invitePerson(from.producer, from.owner, invited)).toEqual({ ok: false, reason: "no-such-store" })
		const again = { email: from.owner.email, name: "Ida Marsh", role: "owner", storeId: null } as const
		expect(await invitePerson(from.producer, from.owner, again)).toEqual({ ok: false, reason: "has-role-already" })
		expect(await outbox(from.producer.id)).toEqual([])
	})

	test("cannot be taken back by another producer", async () => {
		const [from, other] = [await addOwner(), await addOwner()]
		await invite(from, { email: freshAddress(), name: "Rosa Fenn", role: "desk", storeId: null })
		const id = (await listPeople(from.producer.id)).waiting[0]?.invitationId ?? ""
		expect(await withdrawInvitation(other.producer.id, other.owner.id, id)).toBe(false)
		expect((await listPeople(from.producer.id)).waiting).toHaveLength(1)
	})

	test("is mailed to one address five times a day at most", async () => {
		const from = await addOwner()
		const invited = { email: freshAddress(), name: "Rosa Fenn", role: "desk", storeId: null } as const
		const answers = []
		for (let index = 0; index < 7; index++) answers.push(await invitePerson(from.producer, from.owner, invited))
		expect(answers.map(({ ok }) => ok)).toEqual([true, true, true, true, true, false, false])
		expect(await outbox(from.producer.id)).toHaveLength(5)
	})

	test.each(["", "x", "a".repeat(65), "../../etc/passwd", `${"a".repeat(64)}%`])(
		"with the token %j is none",
		async (token) => {
			expect(await findInvitation(token)).toBeNull()
			expect(await acceptInvitation(token, asPerson(await addUser()))).toBe(false)
		},
	)
})
