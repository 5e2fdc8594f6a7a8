import { z } from "zod"

const words = (least: number, most: number, missing: string) =>
	z.string().trim().min(least, missing).max(most, `Write at most ${most} characters.`)

/** What begins a withdrawal: lots by their codes, why, and what those who hold pieces should do. */
export const withdrawalForm = z.object({
	codes: z.array(z.string().min(1).max(80)).min(1, "Choose at least one lot.").max(200),
	reason: words(5, 600, "Write why the lot is called back. Those who had pieces read it."),
	instructions: words(5, 900, "Write what those who hold pieces should do with them."),
	idempotencyKey: z.guid(),
})
