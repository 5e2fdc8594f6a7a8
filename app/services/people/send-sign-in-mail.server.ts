import { eq, lt, sql } from "drizzle-orm"
import { z } from "zod"
import { loginCodes, users } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"
import { now } from "~/platform/clock.server"
import { sendMail } from "~/platform/mailer.server"
import { unseal } from "~/platform/secrets.server"
import { renderMail } from "~emails/render"
import { CODE_MINUTES } from "./sign-in-strategy.server"

const signInMail = z.object({
	id: z.guid(),
	email: z.string(),
	code: z.string(),
	link: z.string(),
	expiresAt: z.iso.datetime(),
})

/** What waits for the worker, sealed: no code and no link stands in the queue in plain. */
export type SignInMail = z.infer<typeof signInMail>

/**
 * Sends the code to a person who is known here, or a letter without one to an address that is not. Does nothing once
 * the code has expired, or when the seal is of another secret: the person asks for a new one. Throws when the mail
 * server does not take it. Codes that expired a day ago are cleared away on the occasion.
 */
export async function sendSignInMail(job: { sealed: string }): Promise<void> {
	const mail = signInMail.safeParse(unseal("sign-in-mail", job.sealed)).data
	if (!mail || new Date(mail.expiresAt) <= now()) return
	const { id, email, code, link } = mail
	const [known] = await withPlatform(async (tx) => {
		// Here and not in the request, which takes the same time for everyone.
		await tx.delete(loginCodes).where(lt(loginCodes.expiresAt, sql`now() - interval '1 day'`))
		return tx.select({ id: users.id }).from(users).where(eq(users.email, email))
	})
	const letter = known
		? await renderMail("sign-in-code", { sentTo: email, code, link, minutesValid: CODE_MINUTES })
		: await renderMail("sign-in-unknown", { sentTo: email })
	await sendMail({ ...letter, to: email, messageId: `<${id}@waxbill>` })
}
