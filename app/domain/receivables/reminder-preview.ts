import { fillBlanks } from "./reminders"

/** A made-up store with two invoices, for looking at a letter before it goes. */
const SAMPLE = {
	storeName: "Pantry & Plume",
	invoices: [
		{ number: "2026-0187", dueOn: "2026-08-01", openCents: 68_400 },
		{ number: "2026-0191", dueOn: "2026-08-08", openCents: 24_500 },
	],
}

/** The words of a step as a made-up store would read them. */
export function previewOf(words: { subject: string; body: string }, yardName: string) {
	const fill = (text: string) => fillBlanks(text, { ...SAMPLE, yardName })
	return { subject: fill(words.subject), body: fill(words.body) }
}
