import { z } from "zod"

/** What a store answers: pieces that it still holds, and a few words. */
export const noticeForm = z.object({
	held: z
		.string()
		.trim()
		.regex(/^\d{1,6}$/, "Write how many pieces you still hold, in figures. If none are left, write 0.")
		.transform(Number),
	note: z.string().trim().max(600, "Write at most 600 characters."),
})
