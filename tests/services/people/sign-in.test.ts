import pg from "pg"
import { beforeEach, describe, expect, test, vi } from "vitest"
import type { OutgoingMail } from "~/platform/mailer.server"
import { hashToken, readSessionToken } from "~/platform/session-cookie.server"
import { findActor } from "~/services/people/find-actor.server"
import { findLanding } from "~/services/people/find-landing.server"
import { sendSignInMail } from "~/services/people/send-sign-in-mail.server"
import { findLink, signInByLink } from "~/services/people/sign-in-by-link.server"
import { action as askAtSignIn } from "../../../app/routes/auth/sign-in"
import { Browser } from "./browser"
import {
	addMembership,
	addProducer,
	addUser,
	asOwner,
	newestMail,
	openSessions,
	queuedSealed,
	tokenOf,
} from "./people-rows"
import { askForCode, signIn, someNetwork, typeCode } from "./sign-in-steps"

const sent = vi.hoisted(() => [] as OutgoingMail[])
vi.mock("~/platform/mailer.server", () => ({ sendMail: async (mail: OutgoingMail) => void sent.push(mail) }))
beforeEach(() => {
	sent.length = 0
})

const personOf = async (browser: Browser) => {
	const token = readSessionToken(browser.get("/"))
	const query = { tokenHash: token && hashToken(token), producerSlug: null, storeSlug: null }
	return (await findActor(query)).person
}

/** Posts the first sign-in page and says all that a visitor can tell apart, and what it cost the database. */
async function askAs(email: string) {
	const asked = vi.spyOn(pg.Client.prototype, "query")
	const request = new Browser().post("/sign-in", { email })
	request.headers.set("x-client-address", someNetwork())
	const answer = await askAtSignIn({ request, url: new URL(request.url), params: {} } as Parameters<
		typeof askAtSignIn
	>[0])
	const statements = asked.mock.calls.length
	asked.mockRestore()
	if (!(answer instanceof Response)) throw new Error("expected a redirect")
	return {
		status: answer.status,
		location: answer.headers.get("location"),
		cookies: answer.headers.getSetCookie().map((line) => line.replace(/=[^;]*/, "")),
		body: await answer.text(),
		statements,
	}
}

describe("the code", () => {
	test("signs in the person whose address it was sent to, under a session of thirty days", async () => {
		const person = await addUser("Rosa Fenn")
		const browser = new Browser()
		await signIn(browser, person.email)
		expect(await personOf(browser)).toMatchObject({ id: person.id, name: "Rosa Fenn" })
		const [row] = await asOwner<{ days: number }>(
			"select extract(day from expires_at - created_at)::int as days from sessions where user_id = $1",
			[person.id],
		)
		expect(row?.days).toBe(30)
	})

	test("is six digits, good for ten minutes", async () => {
		const person = await addUser()
		expect(await askForCode(new Browser(), person.email)).toMatch(/^[0-9]{6}$/)
		const [row] = await asOwner<{ minutes: number }>(
			"select extract(epoch from expires_at - created_at)::int / 60 as minutes from login_codes where email = $1",
			[person.email],
		)
		expect(row?.minutes).toBe(10)
	})

	test("opens nothing once it has expired, and neither does its link", async () => {
		const person = await addUser()
		const browser = new Browser()
		const code = await askForCode(browser, person.email)
		await asOwner("update login_codes set expires_at = now() - interval '1 second' where email = $1", [person.email])
		expect(await typeCode(browser, code)).toEqual({ ok: false, reason: "spent" })
		const token = tokenOf((await newestMail(person.email)).link)
		expect(await findLink(token)).toBeNull()
		expect(await signInByLink(token, browser.get("/"), someNetwork())).toBeNull()
		expect(await openSessions(person.id)).toBe(0)
	})

	test("stands nowhere in plain: not in the table and not in the queue", async () => {
		const person = await addUser()
		const code = await askForCode(new Browser(), person.email)
		const token = tokenOf((await newestMail(person.email)).link)
		const rows = JSON.stringify([
			await asOwner("select code_hash, link_hash from login_codes where email = $1", [person.email]),
			await queuedSealed(),
		])
		expect(rows).not.toContain(`"${code}"`)
		expect(rows).not.toContain(token)
		expect(rows).not.toContain(person.email)
	})

	test("gives a new token each time, and ends the session that the browser held", async () => {
		const person = await addUser()
		const browser = new Browser()
		await signIn(browser, person.email)
		const first = readSessionToken(browser.get("/"))
		await signIn(browser, person.email)
		expect(readSessionToken(browser.get("/"))).not.toBe(first)
		expect(await openSessions(person.id)).toBe(1)
	})

	test("does not sign in under a token that was planted before", async () => {
		const person = await addUser()
		const browser = new Browser()
		browser.cookies.set("waxbill-session", "planted")
		await signIn(browser, person.email)
		expect(readSessionToken(browser.get("/"))).not.toBe("planted")
		expect(
			(await findActor({ tokenHash: hashToken("planted"), producerSlug: null, storeSlug: null })).person,
		).toBeNull()
	})
})

describe("an address that nobody uses here", () => {
	test("gets the same answer, for the same work", async () => {
		const person = await addUser()
		// The first use of a connection costs statements of its own.
		await askAs((await addUser()).email)
		const known = await askAs(person.email)
		expect(known).toMatchObject({ status: 302, location: "/sign-in/code" })
		expect(await askAs(person.email.replace("@", "x@"))).toEqual(known)
	})

	test("is told so by a letter without a code; one that is used gets its code and link", async () => {
		const person = await addUser()
		const stranger = person.email.replace("@", "x@")
		const code = await askForCode(new Browser(), person.email)
		const strangersCode = await askForCode(new Browser(), stranger)
		for (const job of (await queuedSealed()).slice(-2)) await sendSignInMail(job)
		const [toPerson, toStranger] = sent
		expect(toPerson).toMatchObject({ to: person.email })
		expect(toPerson?.text).toContain(code)
		expect(toPerson?.html).toContain((await newestMail(person.email)).link)
		expect(toStranger).toMatchObject({ to: stranger })
		expect(toStranger?.text).not.toContain(strangersCode)
		expect(toStranger?.html).not.toContain("/sign-in/link/")
	})

	test("is not signed in even by the right code", async () => {
		const stranger = (await addUser()).email.replace("@", "x@")
		const browser = new Browser()
		expect(await typeCode(browser, await askForCode(browser, stranger))).toMatchObject({ ok: false })
		expect(await personOf(browser)).toBeNull()
	})
})

describe("the worker", () => {
	test("clears codes away a day after they expired", async () => {
		const [person, other] = [await addUser(), await addUser()]
		await askForCode(new Browser(), person.email)
		await askForCode(new Browser(), other.email)
		await asOwner("update login_codes set expires_at = now() - interval '25 hours' where email = $1", [person.email])
		for (const job of (await queuedSealed()).slice(-1)) await sendSignInMail(job)
		const left = await asOwner("select email from login_codes where email = any($1)", [[person.email, other.email]])
		expect(left).toEqual([{ email: other.email }])
	})

	test("sends nothing for a code that has expired or a job that was made up", async () => {
		const person = await addUser()
		await askForCode(new Browser(), person.email)
		const [job] = (await queuedSealed()).slice(-1)
		if (!job) throw new Error("no job")
		vi.useFakeTimers({ now: Date.now() + 11 * 60_000, toFake: ["Date"] })
		await sendSignInMail(job)
		vi.useRealTimers()
		await sendSignInMail({ sealed: `${job.sealed.slice(0, -4)}AAAA` })
		await sendSignInMail({ sealed: "x" })
		expect(sent).toEqual([])
		await sendSignInMail(job)
		expect(sent).toHaveLength(1)
	})
})

describe("after signing in", () => {
	test("one goes where one wanted to, but never off the site", async () => {
		const person = await addUser()
		const request = new Browser().get("/sign-in/code")
		expect(await findLanding(person.id, request, "/desk/larkmoor/orders?page=2")).toBe("/desk/larkmoor/orders?page=2")
		for (const evil of [
			"//evil.example.test",
			"/\\evil.example.test",
			"https://evil.example.test/x",
			"javascript:alert(1)",
		])
			expect(await findLanding(person.id, request, evil)).toBe("/")
	})

	test("one goes to the only place one has, or to the front page with several", async () => {
		const producer = await addProducer()
		const [volunteer, buyer, both] = [await addUser(), await addUser(), await addUser()]
		await addMembership(producer.id, volunteer.id, "stall")
		await addMembership(producer.id, buyer.id, "buyer", producer.storeId)
		await addMembership(producer.id, buyer.id, "payer", producer.storeId)
		await addMembership(producer.id, both.id, "owner")
		const request = new Browser().get("/sign-in/code")
		expect(await findLanding(volunteer.id, request, null)).toBe(`/stall/${producer.slug}`)
		expect(await findLanding(buyer.id, request, null)).toBe(`/buy/${producer.slug}/pantry`)
		expect(await findLanding(both.id, request, null)).toBe(`/desk/${producer.slug}`)
		await addMembership(producer.id, both.id, "stall")
		expect(await findLanding(both.id, request, null)).toBe("/")
	})
})
