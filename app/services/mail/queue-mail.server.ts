import { sql } from "drizzle-orm"
import { outboxMails } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Letter } from "~emails/templates"

/**
 * Puts a letter into the outbox in the transaction that it tells of: gone on rollback, sent by the worker after commit.
 * `onceKey` names the event; a second letter of the same event to the same person is not written. `delaySeconds` holds
 * it back, so that a decision can still be undone.
 */
export async function queueMail(
	tx: Tx,
	mail: Letter & { producerId: string; to: string; onceKey: string; delaySeconds?: number },
): Promise<void> {
	const [row] = await tx
		.insert(outboxMails)
		.values({
			producerId: mail.producerId,
			recipient: mail.to,
			template: mail.template,
			props: mail.props,
			onceKey: mail.onceKey,
		})
		.onConflictDoNothing()
		.returning({ id: outboxMails.id })
	if (!row) return
	const payload = JSON.stringify({ producerId: mail.producerId, mailId: row.id })
	await tx.execute(
		sql`select jobs.enqueue('send-mail', ${payload}::json, now() + ${mail.delaySeconds ?? 0} * interval '1 second')`,
	)
}
