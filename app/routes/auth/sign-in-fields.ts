import { z } from "zod"

const MISSING = "Write your e-mail address, like name@shop.example."

/** An e-mail address as people type it; spaces around it go and letters become small, as the tables keep them. */
export const emailField = z
	.string(MISSING)
	.trim()
	.toLowerCase()
	.max(254, "This is too long for an e-mail address.")
	.pipe(z.email({ error: (issue) => (issue.input === "" ? MISSING : "This does not look like an e-mail address.") }))

/** Six digits; spaces and dashes between them, as mail programs copy them, do no harm. */
export const codeField = z
	.string("Write the six digits from the mail.")
	.transform((text) => text.replace(/[\s-]/g, ""))
	.pipe(z.string().regex(/^[0-9]{6}$/, "The code is six digits, like 407193."))

/** "in 4 minutes", for whoever has asked too often. */
export function waitWords(seconds: number): string {
	const minutes = Math.ceil(seconds / 60)
	if (minutes <= 1) return "in a minute"
	return minutes < 90 ? `in ${minutes} minutes` : `in ${Math.ceil(minutes / 60)} hours`
}

/** The path with `to` in its query, where the person wanted to go. */
export function withTarget(path: string, to: string | null): string {
	return to === null ? path : `${path}?${new URLSearchParams({ to })}`
}
