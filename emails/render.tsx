import { render, toPlainText } from "react-email"
import { z } from "zod"
import type { DrawElsewhere } from "./props"
import { isTemplateName, type MailAttachment, type Template, templates } from "./templates"

/** A letter ready to be sent; answers go to `replyTo`, the producer it speaks for. */
interface RenderedMail {
	subject: string
	html: string
	text: string
	replyTo: string | undefined
	attachments: MailAttachment[]
}

/** An outbox row that this version cannot write as a letter: trying again does not help, a person has to look. */
export class UnwritableMailError extends Error {
	override name = "UnwritableMailError"
}

/**
 * Writes the letter `template` with `props`, which are plain JSON as read from the outbox. Answers subject, HTML, the
 * text version made from that HTML, and the files that go with it. Throws UnwritableMailError, naming each fault but no
 * value, when the name is unknown or the props do not fit, as in a row that another version wrote. What goes with it is
 * drawn by `draw` where that is given and can.
 */
export async function renderMail(template: string, props: unknown, draw?: DrawElsewhere): Promise<RenderedMail> {
	if (!isTemplateName(template)) throw new UnwritableMailError(`There is no letter named "${template}".`)
	// The union of all letters has no common props; the schema of the same letter has just vouched for these.
	const letter = templates[template] as Template<unknown>
	const parsed = letter.schema.safeParse(props)
	if (!parsed.success) {
		throw new UnwritableMailError(`The letter "${template}" cannot be written: ${faultsOf(parsed.error)}`)
	}
	const Component = letter.default
	const html = await render(<Component {...(parsed.data as object)} />)
	return {
		subject: letter.subject(parsed.data).replace(/\s+/g, " "),
		html,
		// Titles are sentences, and a sentence in capitals shouts.
		text: toPlainText(html, { selectors: [{ selector: "h1", options: { uppercase: false } }] }),
		replyTo: answersTo(parsed.data),
		attachments: (await letter.attachments?.(parsed.data, draw)) ?? [],
	}
}

/** Faults by place, without the values: they land in logs, and a letter is full of names and addresses. */
function faultsOf(error: z.ZodError): string {
	return error.issues.map((issue) => `${issue.path.join(".") || "props"} ${issue.code}`).join("; ")
}

const speaksForYard = z.union([
	z.object({ yard: z.object({ email: z.string() }) }).transform(({ yard }) => yard.email),
	z
		.object({ invoice: z.object({ yard: z.object({ email: z.string() }) }) })
		.transform(({ invoice }) => invoice.yard.email),
	z
		.object({ statement: z.object({ yard: z.object({ email: z.string() }) }) })
		.transform(({ statement }) => statement.yard.email),
])

function answersTo(props: unknown): string | undefined {
	return speaksForYard.safeParse(props).data
}
