import { describe, expect, it } from "vitest"
import { contentSecurityPolicy, originOf } from "~/platform/csp.server"

describe("the content security policy", () => {
	it("lets no inline script or style run but those with the nonce", () => {
		const policy = contentSecurityPolicy({ nonce: "abc" })
		expect(policy).toContain("script-src 'self' 'nonce-abc';")
		expect(policy).toContain("style-src 'self';")
		expect(policy).not.toContain("unsafe")
	})

	it("lets a form's answer lead to the payment page, and to a configured one by its origin alone", () => {
		expect(contentSecurityPolicy({ nonce: "abc" })).toContain("form-action 'self' https://checkout.stripe.com;")
		const paymentOrigin = originOf("http://127.0.0.1:12111/v1?x=1")
		expect(contentSecurityPolicy({ nonce: "abc", paymentOrigin })).toContain(
			"form-action 'self' https://checkout.stripe.com http://127.0.0.1:12111;",
		)
	})

	it("takes no origin from what is not an address", () => {
		expect([originOf(undefined), originOf(""), originOf("not an address")]).toEqual([undefined, undefined, undefined])
	})
})
