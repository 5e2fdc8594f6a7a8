import { describe, expect, test } from "vitest"
import { dropKeptPost } from "~/services/people/drop-kept-post.server"
import { findKeptPost } from "~/services/people/find-kept-post.server"
import { findLanding } from "~/services/people/find-landing.server"
import { keepPost } from "~/services/people/keep-post.server"
import { keptPostCookie, readKeptPostTicket } from "~/services/people/kept-post-cookie.server"
import { action as goOn } from "../../../app/routes/auth/go-on"
import { Browser } from "./browser"
import { addUser, asOwner } from "./people-rows"
import { signIn } from "./sign-in-steps"

const PATH = "/buy/larkmoor/pantry?day=2026-08-18"
const FIELDS: [string, string][] = [
	["intent", "place"],
	["cases", "4"],
	["cases", "2"],
	["note", "To the back door, before 10 am"],
]

/** A post that arrives without a session; the browser keeps the cookie of the answer. */
async function postWithoutSession(browser: Browser, path = PATH, fields = FIELDS): Promise<Response> {
	const answer = await keepPost(browser.post(path, fields))
	browser.take(answer.headers.getSetCookie())
	return answer
}

const keptIn = (browser: Browser, userId: string) => findKeptPost(browser.get("/sign-in/go-on"), userId)

async function decide(browser: Browser, which: "send" | "leave"): Promise<Response> {
	const request = browser.post(`/sign-in/go-on?${which}`, FIELDS)
	const args = { request, url: new URL(request.url), params: {} } as Parameters<typeof goOn>[0]
	const answer: unknown = await goOn(args).catch((thrown: unknown) => thrown)
	if (!(answer instanceof Response)) throw answer
	browser.take(answer.headers.getSetCookie())
	return answer
}

describe("what was posted after the session had ended", () => {
	test("is there after signing in, field by field, and is offered first", async () => {
		const person = await addUser()
		const browser = new Browser()
		const answer = await postWithoutSession(browser)
		expect(answer.status).toBe(303)
		expect(answer.headers.get("location")).toBe(`/sign-in?${new URLSearchParams({ to: PATH })}`)
		await signIn(browser, person.email)
		expect(await findLanding(person.id, browser.get("/sign-in/code"), PATH)).toBe("/sign-in/go-on")
		expect(await keptIn(browser, person.id)).toMatchObject({ path: PATH, fields: FIELDS, wasSent: false })
	})

	test("is handed on as the same post to the same page, and stays in sight without being offered again", async () => {
		const person = await addUser()
		const browser = new Browser()
		await postWithoutSession(browser)
		await signIn(browser, person.email)
		const answer = await decide(browser, "send")
		expect([answer.status, answer.headers.get("location")]).toEqual([307, PATH])
		expect(await keptIn(browser, person.id)).toMatchObject({ fields: FIELDS, wasSent: true })
		expect(await findLanding(person.id, browser.get("/sign-in/code"), "/account")).toBe("/account")
	})

	test("is gone when it is left", async () => {
		const person = await addUser()
		const browser = new Browser()
		await postWithoutSession(browser, "/desk/larkmoor?index&page=2")
		const before = new Map(browser.cookies)
		await signIn(browser, person.email)
		const answer = await decide(browser, "leave")
		expect([answer.status, answer.headers.get("location")]).toEqual([302, "/desk/larkmoor?page=2"])
		for (const [name, value] of before) browser.cookies.set(name, value)
		expect(await keptIn(browser, person.id)).toBeNull()
	})

	test("is shown to nobody but whose session the browser had held", async () => {
		const [person, next] = [await addUser(), await addUser()]
		const browser = new Browser()
		await signIn(browser, person.email)
		await asOwner("update sessions set expires_at = now() where user_id = $1", [person.id])
		await postWithoutSession(browser)
		expect(await keptIn(browser, next.id)).toBeNull()
		expect(await keptIn(browser, person.id)).toMatchObject({ fields: FIELDS })
	})

	test("is gone after an hour", async () => {
		const person = await addUser()
		const browser = new Browser()
		await postWithoutSession(browser)
		await asOwner("update kept_posts set expires_at = now()")
		expect(await keptIn(browser, person.id)).toBeNull()
	})

	test("cannot be had with a cookie of another's making", async () => {
		const person = await addUser()
		const browser = new Browser()
		await postWithoutSession(browser)
		const ticket = readKeptPostTicket(browser.get("/"))
		browser.cookies.set("waxbill-kept", Buffer.from(JSON.stringify(ticket)).toString("base64url"))
		expect(await keptIn(browser, person.id)).toBeNull()
	})

	test("goes back to the page that a client navigation posted to", async () => {
		const person = await addUser()
		const browser = new Browser()
		await postWithoutSession(browser, "/desk/larkmoor.data?index&_routes=routes%2Fdesk%2Ftoday")
		expect((await keptIn(browser, person.id))?.path).toMatch(/^\/desk\/larkmoor\?index=?$/)
	})

	test("is never sent off the site, whatever the path looked like", async () => {
		const person = await addUser()
		const browser = new Browser()
		await postWithoutSession(browser, "//evil.example.test/x")
		await signIn(browser, person.email)
		expect((await decide(browser, "send")).headers.get("location")).toBe("/")
	})

	test("loses its files, and is not kept at all when it is no form or too large", async () => {
		const person = await addUser()
		const form = new FormData()
		form.append("note", "broken in transit")
		form.append("photo", new Blob(["x"]), "comb.jpg")
		const encoded = new Response(form)
		const body = await encoded.arrayBuffer()
		const headers = {
			"content-type": encoded.headers.get("content-type") ?? "",
			"content-length": `${body.byteLength}`,
		}
		const browser = new Browser()
		const request = new Request("http://127.0.0.1:3000/x", { method: "POST", body, headers })
		browser.take((await keepPost(request)).headers.getSetCookie())
		expect((await keptIn(browser, person.id))?.fields).toEqual([["note", "broken in transit"]])

		const large = await postWithoutSession(new Browser(), PATH, [["note", "x".repeat(200_000)]])
		expect([large.status, large.headers.getSetCookie()]).toEqual([303, []])
		const json = browser.post(PATH, {})
		json.headers.set("content-type", "application/json")
		expect((await keepPost(json)).headers.getSetCookie()).toEqual([])
	})

	test("does not give way to a post of the sign-in pages", async () => {
		const answer = await postWithoutSession(new Browser(), "/sign-in/go-on?send")
		expect(answer.headers.getSetCookie()).toEqual([])
	})

	test("is dropped alone, others stay", async () => {
		const person = await addUser()
		const [one, two] = [new Browser(), new Browser()]
		await postWithoutSession(one)
		await postWithoutSession(two)
		await dropKeptPost(readKeptPostTicket(one.get("/"))?.id ?? "")
		expect([await keptIn(one, person.id), await keptIn(two, person.id)]).toMatchObject([null, { fields: FIELDS }])
	})

	test("is bounded in number for one network, and one is sent to sign in all the same", async () => {
		const post = () => {
			const request = new Browser().post(PATH, FIELDS)
			request.headers.set("x-client-address", "192.0.2.77")
			return keepPost(request)
		}
		const answers: Response[] = []
		for (let index = 0; index < 63; index++) answers.push(await post())
		expect(answers.filter((answer) => answer.headers.getSetCookie().length === 1)).toHaveLength(60)
		expect(answers.every(({ status }) => status === 303)).toBe(true)
	})
})

test("the cookie of a kept post is out of reach for scripts and foreign posts", () => {
	const line = keptPostCookie({ id: "00000000-0000-4000-8000-000000000000", userId: null, wasSent: false })
	expect(line).toMatch(/; HttpOnly;.*SameSite=Lax/)
})
