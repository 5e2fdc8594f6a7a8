import { expect, test } from "vitest"
import { cutoffSoonWords, cutoffWords } from "~/domain/delivery/last-orders"

const zone = "America/New_York"
const fridayNoon = new Date("2026-08-14T16:00:00Z")

test("a letter names the cut-off with its date", () => {
	expect(cutoffWords(fridayNoon, zone)).toBe("noon on Friday, August 14")
})

test("a page says how near the cut-off is by the producer's days", () => {
	expect(cutoffSoonWords(fridayNoon, zone, "2026-08-14")).toBe("today at noon")
	expect(cutoffSoonWords(fridayNoon, zone, "2026-08-13")).toBe("tomorrow at noon")
	expect(cutoffSoonWords(fridayNoon, zone, "2026-08-10")).toBe("Friday at noon")
	expect(cutoffSoonWords(fridayNoon, zone, "2026-08-07")).toBe("Friday, August 14 at noon")
	expect(cutoffSoonWords(fridayNoon, zone, "2026-08-15")).toBe("Friday, August 14 at noon")
})
