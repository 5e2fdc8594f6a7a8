import { sql } from "drizzle-orm"
import { outboxMails } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Letter } from "~emails/templates"

/** More rows than this in one statement would come near the number of values that the protocol takes. */
const AT_ONCE = 1_000

/**
 * Puts many letters of one event into the outbox, as `queueMail` does with one, in a statement for each thousand. Gone on
 * rollback; what is written under its key already is not written again. `delaySeconds` holds all of them back.
 */
export async function queueMails(
	tx: Tx,
	producerId: string,
	mails: readonly (Letter & { to: string; onceKey: string })[],
	{ delaySeconds = 0 }: { delaySeconds?: number } = {},
): Promise<void> {
	for (let from = 0; from < mails.length; from += AT_ONCE) {
		const rows = await tx
			.insert(outboxMails)
			.values(
				mails.slice(from, from + AT_ONCE).map(({ to, template, props, onceKey }) => ({
					producerId,
					recipient: to,
					template,
					props,
					onceKey,
				})),
			)
			.onConflictDoNothing()
			.returning({ id: outboxMails.id })
		const payloads = rows.map(({ id }) => JSON.stringify({ producerId, mailId: id }))
		await tx.execute(
			delaySeconds > 0
				? sql`select jobs.enqueue('send-mail', payload::json, now() + ${delaySeconds} * interval '1 second')
					from unnest(${sql.param(payloads)}::text[]) as payload`
				: sql`select jobs.enqueue_all('send-mail', ${sql.param(payloads)}::text[]::json[])`,
		)
	}
}
