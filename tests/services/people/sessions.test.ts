import { describe, expect, test } from "vitest"
import { hashToken, readSessionToken } from "~/platform/session-cookie.server"
import { endSession } from "~/services/people/end-session.server"
import { findActor } from "~/services/people/find-actor.server"
import { listSessions } from "~/services/people/list-sessions.server"
import { action as signOut } from "../../../app/routes/auth/sign-out"
import { Browser } from "./browser"
import { addUser, asOwner, openSessions } from "./people-rows"
import { signIn } from "./sign-in-steps"

const personOf = async (browser: Browser) => {
	const token = readSessionToken(browser.get("/"))
	return (await findActor({ tokenHash: token && hashToken(token), producerSlug: null, storeSlug: null })).person
}

describe("sessions", () => {
	test("are listed for their person alone, the newest first", async () => {
		const [person, other] = [await addUser(), await addUser()]
		const [desk, phone, stranger] = [new Browser(), new Browser(), new Browser()]
		await signIn(desk, person.email)
		await signIn(phone, person.email)
		await signIn(stranger, other.email)
		const listed = await listSessions(person.id)
		expect(listed.map(({ id }) => id)).toEqual([(await personOf(phone))?.sessionId, (await personOf(desk))?.sessionId])
		expect(listed[0]?.userAgent).toContain("Firefox")
	})

	test("can be ended by their person, and then open nothing", async () => {
		const person = await addUser()
		const [desk, phone] = [new Browser(), new Browser()]
		await signIn(desk, person.email)
		await signIn(phone, person.email)
		const lost = (await personOf(phone))?.sessionId ?? ""
		expect(await endSession(person.id, lost)).toBe(true)
		expect(await personOf(phone)).toBeNull()
		expect(await personOf(desk)).toMatchObject({ id: person.id })
		expect((await listSessions(person.id)).map(({ id }) => id)).not.toContain(lost)
	})

	test("cannot be ended by another person", async () => {
		const [person, other] = [await addUser(), await addUser()]
		const browser = new Browser()
		await signIn(browser, person.email)
		const sessionId = (await personOf(browser))?.sessionId ?? ""
		expect(await endSession(other.id, sessionId)).toBe(false)
		expect(await personOf(browser)).toMatchObject({ id: person.id })
	})

	test("are over after their thirty days", async () => {
		const person = await addUser()
		const browser = new Browser()
		await signIn(browser, person.email)
		await asOwner("update sessions set expires_at = now() - interval '1 second' where user_id = $1", [person.id])
		expect(await personOf(browser)).toBeNull()
		expect(await listSessions(person.id)).toEqual([])
	})

	test("end with signing out, in the table and in the browser", async () => {
		const person = await addUser()
		const browser = new Browser()
		await signIn(browser, person.email)
		const request = browser.post("/sign-out", {})
		const answer = await signOut({ request, url: new URL(request.url), params: {} } as Parameters<typeof signOut>[0])
		expect(await openSessions(person.id)).toBe(0)
		browser.take(answer.headers.getSetCookie())
		expect(readSessionToken(browser.get("/"))).toBeNull()
	})
})
