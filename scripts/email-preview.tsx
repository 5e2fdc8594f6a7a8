/**
 * Writes one view of the letters to standard output, for scripts/email.mjs:
 *   list                  names and subjects of all letters, as JSON
 *   html | text  <name>   the letter with its made-up data
 *   file         <name>   the first file that goes with the letter
 */
import { renderMail } from "~emails/render"
import { isTemplateName, type Template, templates } from "~emails/templates"

async function view(what: string | undefined, name = ""): Promise<string | Buffer | undefined> {
	if (what === "list") {
		const letters = Object.entries(templates as Record<string, Template<unknown>>)
		return JSON.stringify(letters.map(([name, letter]) => ({ name, subject: letter.subject(letter.sample) })))
	}
	if (!isTemplateName(name)) return undefined
	const mail = await renderMail(name, templates[name].sample)
	if (what === "html") return mail.html
	if (what === "text") return mail.text
	return mail.attachments[0]?.content
}

const [what, name] = process.argv.slice(2)
const output = await view(what, name)
if (output === undefined) process.exitCode = 4
else process.stdout.write(output)
