import { expect, test } from "vitest"
import { cutoffSoonWords, cutoffWords } from "~/domain/delivery/last-orders"

const FRIDAY_NOON = new Date("2026-08-14T16:00:00Z")
const ZONE = "America/New_York"

test("a letter names the cut-off with its date, by the producer's clocks", () => {
	expect(cutoffWords(FRIDAY_NOON, ZONE)).toBe("noon on Friday, August 14")
})

test.each([
	["2026-08-14", "today at noon"],
	["2026-08-13", "tomorrow at noon"],
	["2026-08-10", "Friday at noon"],
	["2026-08-07", "Friday, August 14 at noon"],
	["2026-08-15", "Friday, August 14 at noon"],
])("a page of %s calls it %s", (today, words) => {
	expect(cutoffSoonWords(FRIDAY_NOON, ZONE, today)).toBe(words)
})
