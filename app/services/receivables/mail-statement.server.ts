import { auditEntries } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { effectOf, type StatementRange } from "~/domain/receivables/statement"
import type { Result } from "~/domain/result"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findStorePeople } from "~/services/orders/order-people.server"
import { MOST_MAILED_LINES } from "~emails/documents/statement-props"
import { readStatement } from "./find-statement.server"
import { statementDocument } from "./statement-document.server"

/**
 * Mails a store its whole statement: to each of its people who takes invoices by letter, with the printed pages, or with the
 * link to them where they are too long for a letter. `mailKey` is made with the button: a second press sends nothing more.
 * Answers whom it goes to, by name. Refused when nobody is there to read it. Recorded.
 */
export function mailStatement(query: {
	producerId: string
	storeId: string
	range: StatementRange
	today: Day
	personId: string
	mailKey: string
}): Promise<Result<{ told: string[] }, { ok: false; reason: "nobody" }>> {
	const { producerId, storeId, range, personId, mailKey } = query
	return withProducer(producerId, async (tx) => {
		const people = await findStorePeople(tx, { producerId, storeId, kind: "invoices" })
		if (people.length === 0) return { ok: false, reason: "nobody" }
		const found = await readStatement(tx, { ...query, isWhole: true })
		const isTooLong = found.lines.length > MOST_MAILED_LINES
		const statement = statementDocument(isTooLong ? { ...found, lines: [] } : found)
		const effects = found.lines.map(effectOf)
		const sumOf = (isRaising: boolean) =>
			effects.filter((cents) => cents > 0 === isRaising).reduce((sum, cents) => sum + cents, 0)
		const address = `${env.BASE_URL}/buy/${found.store.producerSlug}/${found.store.slug}/statement`
		const search = new URLSearchParams(range)
		await queueMails(
			tx,
			producerId,
			people.map(({ email }) => ({
				to: email,
				template: "statement" as const,
				onceKey: `statement:${mailKey}`,
				props: {
					statement,
					isTooLong,
					raisedCents: sumOf(true),
					loweredCents: sumOf(false),
					sentTo: email,
					statementUrl: `${address}?${search}`,
					pdfUrl: `${address}.pdf?${search}`,
				},
			})),
		)
		const told = people.map(({ name }) => name)
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "statement mailed",
			subjectType: "store",
			subjectId: storeId,
			detail: { ...range, told },
		})
		return { ok: true, told }
	})
}
