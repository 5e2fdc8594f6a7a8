import { z } from "zod"

const MOST = 2000

/** A message as it is posted: line ends as one, no more than 2,000 characters, and the key made with the form. */
const messageForm = z.object({
	body: z
		.string()
		.transform((text) => text.replaceAll("\r\n", "\n").replaceAll("\u0000", "").trim())
		.refine((text) => text !== "", "Write something first.")
		.refine((text) => [...text].length <= MOST, `Shorten it to ${MOST.toLocaleString("en-US")} characters.`),
	messageKey: z.guid(),
})

/** Reads a posted message; a key that no form of ours made is answered with the words for the head of the page. */
export function readMessage(
	form: FormData,
): { ok: true; body: string; key: string } | { ok: false; errors: Record<string, string>; values: { body: string } } {
	const typed = String(form.get("body") ?? "")
	const read = messageForm.safeParse({ body: typed, messageKey: form.get("messageKey") })
	if (read.success) return { ok: true, body: read.data.body, key: read.data.messageKey }
	const issue = read.error.issues.find(({ path }) => path[0] === "body")
	const errors: Record<string, string> = issue
		? { body: issue.message }
		: { "": "Open the page again and send it from there." }
	return { ok: false, errors, values: { body: typed } }
}
