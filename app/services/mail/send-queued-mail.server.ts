import { and, eq, isNull, sql } from "drizzle-orm"
import { outboxMails } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { askThread } from "~/platform/lasting-thread.server"
import { log } from "~/platform/log.server"
import { sendMail } from "~/platform/mailer.server"
import { renderMail, UnwritableMailError } from "~emails/render"

/**
 * Sends one letter of the outbox, unless it is gone already or another worker has it in hand. The row stays locked
 * until the mail server has taken the letter, so that it is sent once; only a crash between the two sends it again,
 * under the same Message-ID. Throws what the mail server says: the job is then tried again after a growing pause. A letter
 * that cannot be written is not tried again; its row keeps the reason for a person to see.
 */
export async function sendQueuedMail(query: { producerId: string; mailId: string }): Promise<void> {
	const { producerId, mailId } = query
	const isIt = and(eq(outboxMails.producerId, producerId), eq(outboxMails.id, mailId))
	const failure = await withProducer(producerId, async (tx) => {
		const [mail] = await tx
			.select()
			.from(outboxMails)
			.where(and(isIt, isNull(outboxMails.sentAt)))
			.for("update", { skipLocked: true })
		if (!mail) return null
		try {
			const letter = await renderMail(mail.template, mail.props, askThread)
			await sendMail({ ...letter, to: mail.recipient, messageId: `<${mail.id}@waxbill>` })
			await tx
				.update(outboxMails)
				.set({ sentAt: sql`now()`, attempts: mail.attempts + 1, lastError: "" })
				.where(isIt)
			return null
		} catch (error) {
			// Kept on the row, where a person can see it; the job fails outside, after this is written.
			const lastError = error instanceof Error ? error.message.slice(0, 500) : "unknown"
			await tx
				.update(outboxMails)
				.set({ attempts: mail.attempts + 1, lastError })
				.where(isIt)
			if (!(error instanceof UnwritableMailError)) return error
			log.error({ mailId, template: mail.template, lastError }, "a letter of the outbox cannot be written")
			return null
		}
	})
	if (failure) throw failure
}
