import { describe, expect, test } from "vitest"
import { env } from "~/platform/env.server"
import { checkCode } from "~/services/people/check-code.server"
import { readCodeTicket } from "~/services/people/code-cookie.server"
import { requestCode } from "~/services/people/request-code.server"
import { findLink, signInByLink } from "~/services/people/sign-in-by-link.server"
import { action as askAtSignIn } from "../../../app/routes/auth/sign-in"
import { Browser } from "./browser"
import { addUser, asOwner, mailsTo, newestMail, openSessions, tokenOf } from "./people-rows"
import { askForCode, otherCode, someNetwork, typeCode } from "./sign-in-steps"

const TOTP = "_totp"
const CODE = "waxbill-code"

/** The strategy's cookie with another address written into it. */
function withAddress(cookie: string | undefined, email: string): string {
	const fields = new URLSearchParams(cookie)
	fields.set("email", email)
	return fields.toString()
}

async function attemptsFor(email: string): Promise<number[]> {
	const rows = await asOwner<{ attempts: number }>("select attempts from login_codes where email = $1", [email])
	return rows.map(({ attempts }) => attempts)
}

describe("another's address", () => {
	test("the edit that these attacks make is one that the strategy reads", async () => {
		const person = await addUser()
		const browser = new Browser()
		const code = await askForCode(browser, person.email)
		const elsewhere = withAddress(browser.cookies.get(TOTP), "someone@else.example.test")
		browser.cookies.set(TOTP, withAddress(elsewhere, person.email))
		expect(await typeCode(browser, code)).toMatchObject({ ok: true, userId: person.id })
	})

	test("the strategy's cookie with a victim's address and one's own code signs nobody in", async () => {
		const [attacker, victim] = [await addUser(), await addUser()]
		const browser = new Browser()
		const code = await askForCode(browser, attacker.email)
		browser.cookies.set(TOTP, withAddress(browser.cookies.get(TOTP), victim.email))
		expect(await typeCode(browser, code)).toMatchObject({ ok: false, reason: "wrong" })
		expect([await openSessions(victim.id), await openSessions(attacker.id)]).toEqual([0, 0])
	})

	test("a code for one address is worth nothing for the one asked for in another browser", async () => {
		const [attacker, victim] = [await addUser(), await addUser()]
		const [own, other] = [new Browser(), new Browser()]
		const code = await askForCode(own, attacker.email)
		await askForCode(other, victim.email)
		own.cookies.set(TOTP, withAddress(own.cookies.get(TOTP), victim.email))
		own.cookies.set(CODE, other.cookies.get(CODE) ?? "")
		expect(await typeCode(own, code)).toMatchObject({ ok: false, reason: "wrong" })
		expect(await openSessions(victim.id)).toBe(0)
	})

	test("the code of one's own, moved to the victim's row in the table, is still not the victim's", async () => {
		const [attacker, victim] = [await addUser(), await addUser()]
		const browser = new Browser()
		const code = await askForCode(browser, attacker.email)
		await asOwner("update login_codes set email = $1 where email = $2", [victim.email, attacker.email])
		browser.cookies.set(TOTP, withAddress(browser.cookies.get(TOTP), victim.email))
		expect(await typeCode(browser, code)).toMatchObject({ ok: false, reason: "wrong" })
		expect(await openSessions(victim.id)).toBe(0)
	})

	test("a cookie that names another's code by hand is no cookie", async () => {
		const victim = await addUser()
		const browser = new Browser()
		await askForCode(browser, victim.email)
		const forged = Buffer.from(JSON.stringify({ id: (await newestMail(victim.email)).id, email: victim.email }))
		browser.cookies.set(CODE, forged.toString("base64url"))
		expect(readCodeTicket(browser.get("/sign-in/code"))).toBeNull()
	})
})

describe("unlimited tries", () => {
	test("after five wrong codes the right one opens nothing, whatever cookies are put back", async () => {
		const person = await addUser()
		const browser = new Browser()
		const code = await askForCode(browser, person.email)
		const atFirst = new Map(browser.cookies)
		const answers = []
		for (let index = 0; index < 5; index++) {
			for (const [name, value] of atFirst) browser.cookies.set(name, value)
			answers.push(await typeCode(browser, otherCode(code)))
		}
		expect(answers.map((answer) => "triesLeft" in answer && answer.triesLeft)).toEqual([4, 3, 2, 1, false])
		expect(await typeCode(browser, code)).toEqual({ ok: false, reason: "spent" })
		expect(await openSessions(person.id)).toBe(0)
	})

	test("of ten wrong codes at once five are counted and five are not looked at", async () => {
		const person = await addUser()
		const browser = new Browser()
		const wrong = otherCode(await askForCode(browser, person.email))
		const answers = await Promise.all(Array.from({ length: 10 }, () => typeCode(browser, wrong)))
		const reasons = answers.map((answer) => (answer.ok ? "signed in" : answer.reason)).toSorted()
		expect(reasons).toEqual([...Array(6).fill("spent"), ...Array(4).fill("wrong")])
		expect(await attemptsFor(person.email)).toEqual([5])
	})

	test("one network has a bounded number of tries, over all addresses", async () => {
		const person = await addUser()
		const browser = new Browser()
		const code = await askForCode(browser, person.email)
		const network = someNetwork()
		for (let index = 0; index < 100; index++) await signInByLink("no-such-link", browser.get("/"), network)
		const request = browser.post("/sign-in/code", { code })
		const ticket = readCodeTicket(request)
		if (!ticket) throw new Error("no ticket")
		expect(await checkCode(ticket, code, request, network)).toMatchObject({ ok: false, reason: "too-many" })
		expect(await signInByLink(tokenOf((await newestMail(person.email)).link), browser.get("/"), network)).toBeNull()
	})
})

describe("replay", () => {
	test("a code signs in once, also with the cookies of the first time", async () => {
		const person = await addUser()
		const browser = new Browser()
		const code = await askForCode(browser, person.email)
		const again = new Browser()
		for (const [name, value] of browser.cookies) again.cookies.set(name, value)
		expect(await typeCode(browser, code)).toMatchObject({ ok: true, userId: person.id })
		expect(await typeCode(again, code)).toEqual({ ok: false, reason: "spent" })
		expect(await openSessions(person.id)).toBe(1)
	})

	test("the right code ten times at once signs in once", async () => {
		const person = await addUser()
		const browser = new Browser()
		const code = await askForCode(browser, person.email)
		const request = browser.post("/sign-in/code", { code })
		const ticket = readCodeTicket(request)
		if (!ticket) throw new Error("no ticket")
		const answers = await Promise.all(
			Array.from({ length: 10 }, () => checkCode(ticket, code, request.clone(), someNetwork())),
		)
		expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
		expect(await openSessions(person.id)).toBe(1)
	})

	test("a link signs in once, from any browser, and uses the code of its mail up", async () => {
		const person = await addUser()
		const browser = new Browser()
		const code = await askForCode(browser, person.email)
		const token = tokenOf((await newestMail(person.email)).link)
		expect(await findLink(token)).toBe(person.email)
		expect(await signInByLink(token, new Browser().get("/"), someNetwork())).toMatchObject({ userId: person.id })
		expect(await signInByLink(token, new Browser().get("/"), someNetwork())).toBeNull()
		expect(await findLink(token)).toBeNull()
		expect(await typeCode(browser, code)).toEqual({ ok: false, reason: "spent" })
		expect(await openSessions(person.id)).toBe(1)
	})
})

describe("forged link host", () => {
	test("the mailed link names the configured address, whatever host the request names", async () => {
		const person = await addUser()
		const request = new Browser().post("/sign-in?to=%2Faccount", { email: person.email }, "https://evil.example.test")
		request.headers.set("host", "evil.example.test")
		request.headers.set("x-forwarded-host", "evil.example.test")
		await askAtSignIn({ request, url: new URL(request.url), params: {} } as Parameters<typeof askAtSignIn>[0])
		const { link } = await newestMail(person.email)
		expect(new URL(link).origin).toBe(env.BASE_URL)
		expect(link).not.toContain("evil")
		expect(new URL(link).searchParams.get("to")).toBe("/account")
	})
})

describe("unlimited mails", () => {
	test("an address gets five in a quarter of an hour, from however many networks they are asked for", async () => {
		const person = await addUser()
		const answers = []
		for (let index = 0; index < 7; index++) {
			answers.push(await requestCode({ email: person.email, network: someNetwork(), to: null }))
		}
		expect(answers.map(({ ok }) => ok)).toEqual([true, true, true, true, true, false, false])
		expect(answers[6]).toMatchObject({ reason: "too-many", retryAfterSeconds: expect.any(Number) })
		expect(await mailsTo(person.email)).toHaveLength(5)
	})

	test("a network has forty sent in a quarter of an hour, to however many addresses", async () => {
		const network = someNetwork()
		const ask = (index: number) => requestCode({ email: `${network}-${index}@a.example.test`, network, to: null })
		const answers = await Promise.all(Array.from({ length: 45 }, (_, index) => ask(index)))
		expect(answers.filter(({ ok }) => ok)).toHaveLength(40)
	})

	test("when it cannot be counted, nothing is sent", async () => {
		const person = await addUser()
		await asOwner("revoke all on rate_limits from waxbill_app")
		try {
			await expect(requestCode({ email: person.email, network: someNetwork(), to: null })).rejects.toThrow()
		} finally {
			await asOwner("grant select, insert, update, delete on rate_limits to waxbill_app")
		}
		expect(await mailsTo(person.email)).toEqual([])
	})
})
