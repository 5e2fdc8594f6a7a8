import { z } from "zod"

/** Ten million dollars: beyond that it is a slip of the hand, and beyond what the database holds in cents. */
const MOST_CENTS = 1_000_000_000

/** Reads money as typed, "929.90", "$1,118" or "42"; null when it is none. Nothing is rounded. */
export function centsOf(text: string): number | null {
	const [, whole, part = ""] = /^\$?\s*(\d{1,3}(?:,\d{3})+|\d{1,12})(?:\.(\d{1,2}))?$/.exec(text.trim()) ?? []
	if (whole === undefined) return null
	return Number(whole.replaceAll(",", "")) * 100 + Number(part.padEnd(2, "0"))
}

/** A payment noted by hand: how it came, how much, and the key made with the form. */
export const paymentForm = z.object({
	method: z.enum(["cheque", "cash", "transfer"], "Choose how it came."),
	amount: z.string().transform((text, context) => {
		const cents = centsOf(text)
		const message =
			text.trim() === ""
				? "Write how much came in."
				: /^\s*[-−–]/.test(text)
					? "A payment cannot be less than nothing."
					: cents === null
						? "Write dollars and cents, such as 929.90."
						: cents === 0
							? "Write more than nothing."
							: cents > MOST_CENTS
								? "That is more than one payment can be. Look at the figure again."
								: null
		if (message === null && cents !== null) return cents
		context.addIssue({ code: "custom", message: message ?? "Write dollars and cents, such as 929.90." })
		return z.NEVER
	}),
	paymentId: z.guid(),
})
