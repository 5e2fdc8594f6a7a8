import { expect } from "@playwright/test"
import { e2eAddresses } from "../setup/e2e-addresses"

export type CaughtMail = { id: string; subject: string; text: string; html: string; to: { address: string }[] }

async function mailsTo(address: string): Promise<CaughtMail[]> {
	const answer = await fetch(`${e2eAddresses().mail}/api/email`)
	const mails = (await answer.json()) as CaughtMail[]
	return mails.filter(({ to }) => to.some((one) => one.address === address))
}

/**
 * Remembers the mails that this address has already, and answers a function that waits for the next one. Open it before
 * the step that sends.
 */
export async function openInbox(address: string): Promise<() => Promise<CaughtMail>> {
	const seen = new Set((await mailsTo(address)).map(({ id }) => id))
	return async () => {
		let next: CaughtMail | undefined
		await expect
			.poll(
				async () => {
					next = (await mailsTo(address)).find(({ id }) => !seen.has(id))
					return next !== undefined
				},
				{ message: `a mail to ${address}`, timeout: 20_000 },
			)
			.toBe(true)
		if (!next) throw new Error("the mail was there a moment ago")
		seen.add(next.id)
		return next
	}
}

/** The six digits in a sign-in mail. */
export function codeIn(mail: CaughtMail): string {
	const code = /\b\d{6}\b/.exec(mail.text)?.[0]
	if (!code) throw new Error(`no code in: ${mail.text}`)
	return code
}

/** The first link to `path` in a mail. */
export function linkIn(mail: CaughtMail, path: string): string {
	const links = [...mail.html.matchAll(/href="([^"]+)"/g)].map(([, href = ""]) => href.replaceAll("&amp;", "&"))
	const link = links.find((href) => href.includes(path))
	if (!link) throw new Error(`no link to ${path}`)
	return link
}
