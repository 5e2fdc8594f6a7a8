import fc from "fast-check"
import { expect, test } from "vitest"
import { ageing, ageingBuckets } from "~/domain/invoicing/ageing"
import { certificateNotice, certificateType } from "~/domain/receivables/certificate"
import { creditWarning } from "~/domain/receivables/credit-standing"
import { chargedMonth, financeCharge } from "~/domain/receivables/finance-charge"
import { isStoreSlug, slugOf } from "~/domain/receivables/store-slug"

test("an order is to be looked at when the store is stopped, or owes more with it than its limit", () => {
	const facts = { isStopped: false, creditLimitCents: 100_000, owedCents: 90_000 }
	expect(creditWarning(facts, 10_000)).toBeNull()
	expect(creditWarning(facts, 10_001)).toEqual({ kind: "over-limit", owedCents: 90_000, limitCents: 100_000 })
	expect(creditWarning({ ...facts, creditLimitCents: null }, 9_999_999)).toBeNull()
	expect(creditWarning({ ...facts, creditLimitCents: 0, owedCents: 0 }, 1)).toMatchObject({ kind: "over-limit" })
	expect(creditWarning({ ...facts, isStopped: true }, 0)).toEqual({ kind: "stopped" })
})

const rule = { basisPoints: 150, afterDays: 30, asOf: "2026-10-01" }
const invoice = (number: string, dueOn: string, openCents: number, kind: "goods" | "finance-charge" = "goods") => ({
	number,
	dueOn,
	openCents,
	kind,
})

test("a charge is so much of what is overdue by more than the days, and never of an earlier charge", () => {
	const invoices = [
		invoice("2026-0001", "2026-08-31", 100_000),
		invoice("2026-0002", "2026-09-01", 50_000),
		invoice("2026-0003", "2026-07-01", 9_000, "finance-charge"),
	]
	expect(financeCharge(invoices, rule)).toEqual({ cents: 1_500, overdueCents: 100_000, numbers: ["2026-0001"] })
})

test("nothing overdue, no rate, or less than a cent is no charge", () => {
	expect(financeCharge([], rule)).toBeNull()
	expect(financeCharge([invoice("a", "2026-01-01", 100_000)], { ...rule, basisPoints: 0 })).toBeNull()
	expect(financeCharge([invoice("a", "2026-01-01", 20)], rule)).toBeNull()
})

test("a month is charged on the first days of the next and on no other", () => {
	expect(chargedMonth("2026-10-01")).toEqual({ key: "2026-09", asOf: "2026-10-01" })
	expect(chargedMonth("2027-01-03")).toEqual({ key: "2026-12", asOf: "2027-01-01" })
	expect(chargedMonth("2026-10-04")).toBeNull()
})

test("what is owed is all in the columns of its ageing, whatever the days", () => {
	const open = fc.record({
		dueOn: fc.integer({ min: 1, max: 28 }).map((day) => `2026-0${(day % 8) + 1}-${String(day).padStart(2, "0")}`),
		openCents: fc.integer({ min: 1, max: 1_000_000 }),
	})
	fc.assert(
		fc.property(fc.array(open), (invoices) => {
			const sums = ageing(invoices, "2026-08-31")
			expect(ageingBuckets.reduce((sum, bucket) => sum + sums[bucket], 0)).toBe(
				invoices.reduce((sum, { openCents }) => sum + openCents, 0),
			)
		}),
	)
})

test("a file is what its first bytes say", () => {
	const bytes = (text: string) => Uint8Array.from(text, (sign) => sign.charCodeAt(0))
	expect(certificateType(bytes("%PDF-1.7\n…"))).toBe("application/pdf")
	expect(certificateType(bytes("\xff\xd8\xff\xe0"))).toBe("image/jpeg")
	expect(certificateType(bytes("\x89PNG\r\n\x1a\n"))).toBe("image/png")
	expect(certificateType(bytes("RIFF1234WEBPVP8 "))).toBe("image/webp")
	expect(certificateType(bytes("1234____WEBP"))).toBeNull()
	expect(certificateType(bytes("<html><script>"))).toBeNull()
	expect(certificateType(bytes(""))).toBeNull()
})

test("the end of a certificate is told 30 and 7 days before, and not once it has passed", () => {
	expect(certificateNotice("2026-10-01", "2026-08-31")).toBeNull()
	expect(certificateNotice("2026-10-01", "2026-09-01")).toBe(30)
	expect(certificateNotice("2026-10-01", "2026-09-23")).toBe(30)
	expect(certificateNotice("2026-10-01", "2026-09-24")).toBe(7)
	expect(certificateNotice("2026-10-01", "2026-10-01")).toBe(7)
	expect(certificateNotice("2026-10-01", "2026-10-02")).toBeNull()
})

test("a store's name in addresses is made of what can stand there, and is none that a page has", () => {
	expect(slugOf("Pantry & Plume")).toBe("pantry-and-plume")
	expect(slugOf("  Café d’Été №5 ")).toBe("cafe-dete-5")
	expect(slugOf("蜂")).toBe("")
	fc.assert(
		fc.property(fc.string({ unit: "grapheme" }), (name) => {
			const slug = slugOf(name)
			expect(slug === "" || slug === "new" || isStoreSlug(slug)).toBe(true)
		}),
	)
	for (const slug of ["", "new", "-a", "a--b", "A", "a b", "x".repeat(61)]) expect(isStoreSlug(slug)).toBe(false)
})
