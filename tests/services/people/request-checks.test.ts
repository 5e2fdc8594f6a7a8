import { describe, expect, test, vi } from "vitest"
import { clientNetwork } from "~/platform/client-network.server"
import { isSameOrigin } from "~/platform/origin-check.server"
import { hmac, seal, unseal } from "~/platform/secrets.server"
import { sessionCookie } from "~/platform/session-cookie.server"
import { safeTarget } from "~/services/people/safe-target.server"

const post = (headers: Record<string, string>, url = "http://127.0.0.1:3000/sign-in") => {
	const request = new Request(url, { method: "POST" })
	for (const [name, value] of Object.entries(headers)) request.headers.set(name, value)
	return request
}

describe("a post is ours", () => {
	test.each([
		["from the public address", { origin: "http://127.0.0.1:3000" }, true],
		["from a foreign page", { origin: "https://evil.example.test" }, false],
		["from another port of the same host", { origin: "http://127.0.0.1:3001" }, false],
		[
			"from a foreign page that says it is the same",
			{ origin: "https://evil.example.test", "sec-fetch-site": "same-origin" },
			false,
		],
		["with a hidden origin on the same site's word", { origin: "null", "sec-fetch-site": "same-origin" }, true],
		["with a hidden origin from elsewhere", { origin: "null", "sec-fetch-site": "cross-site" }, false],
		["with no origin from a neighbouring host", { "sec-fetch-site": "same-site" }, false],
		["with no origin on the same site's word", { "sec-fetch-site": "same-origin" }, true],
		["with nothing said", {}, false],
	])("%s: %j is %s", (_what, headers, expected) => {
		expect(isSameOrigin(post(headers))).toBe(expected)
	})

	test("when it comes from the very address that it went to", () => {
		const url = "http://desk.local.example.test/sign-in"
		expect(isSameOrigin(post({ origin: "http://desk.local.example.test" }, url))).toBe(true)
	})
})

test.each([
	["/account", "/account"],
	["/desk/larkmoor?x=1#y", "/desk/larkmoor?x=1"],
	["http://127.0.0.1:3000/account", "/account"],
	["account", "/account"],
	["//evil.example.test", null],
	["/\\evil.example.test", null],
	["\\\\evil.example.test", null],
	["/\t/evil.example.test", null],
	["https://evil.example.test", null],
	["http://127.0.0.1:3001/", null],
	["javascript:alert(1)", null],
	["data:text/html,x", null],
	["http://", null],
	["/sign-in", null],
	["/sign-out", null],
	["/sign-in/code", null],
	["/sign-ins", "/sign-ins"],
	["", null],
	[null, null],
])("the target %j is taken as %j", (to, expected) => {
	expect(safeTarget(to)).toBe(expected)
})

test.each([
	["203.0.113.9", "203.0.113.9"],
	["::ffff:203.0.113.9", "203.0.113.9"],
	["2001:db8:1:2:3:4:5:6", "2001:db8:1:2::/64"],
	["2001:db8:1:2::9", "2001:db8:1:2::/64"],
	["2001:0db8:0001:0002::9", "2001:db8:1:2::/64"],
	["::1", "0:0:0:0::/64"],
	["fe80::1%eth0", "fe80:0:0:0::/64"],
])("the address %s counts for the network %s", (address, network) => {
	expect(clientNetwork(post({ "x-client-address": address }))).toBe(network)
})

test("what is sealed is read by nobody else, for no other purpose, and not after a change", () => {
	const sealed = seal("sign-in-mail", { code: "407193" })
	expect(unseal("sign-in-mail", sealed)).toEqual({ code: "407193" })
	expect(unseal("kept-post", sealed)).toBeNull()
	expect(unseal("sign-in-mail", `${sealed.startsWith("A") ? "B" : "A"}${sealed.slice(1)}`)).toBeNull()
	expect(unseal("sign-in-mail", "")).toBeNull()
	expect(sealed).not.toBe(seal("sign-in-mail", { code: "407193" }))
})

test("a hash tells its parts apart", () => {
	expect(hmac("rate-limit", "ab", "c")).not.toBe(hmac("rate-limit", "a", "bc"))
	expect(hmac("rate-limit", "ab")).not.toBe(hmac("sign-in-code", "ab"))
})

test("over TLS the session cookie is bound to the host and sent over nothing else", async () => {
	expect(sessionCookie("t").split("; ").sort()).toEqual(
		["waxbill-session=t", "HttpOnly", "Max-Age=2592000", "Path=/", "SameSite=Lax"].sort(),
	)
	vi.resetModules()
	vi.stubEnv("BASE_URL", "https://orders.example.test")
	const overTls = await import("~/platform/session-cookie.server")
	const line = overTls.sessionCookie("t")
	expect(line).toMatch(/^__Host-waxbill-session=t; /)
	expect(line.split("; ")).toEqual(expect.arrayContaining(["HttpOnly", "Secure", "SameSite=Lax", "Path=/"]))
	vi.unstubAllEnvs()
})
