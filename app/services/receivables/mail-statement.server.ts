import { auditEntries } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { StatementRange } from "~/domain/receivables/statement"
import type { Result } from "~/domain/result"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findStorePeople } from "~/services/orders/order-people.server"
import { MOST_STATEMENT_LINES } from "~emails/documents/statement-props"
import { readStatement } from "./find-statement.server"
import { statementDocument } from "./statement-document.server"

/**
 * Mails a store its whole statement: to each of its people who takes invoices by letter, with the printed pages. `mailKey`
 * is made with the button: a second press sends nothing more. Answers whom it goes to, by name. Refused when nobody is
 * there to read it, or it has more lines than a letter carries. Recorded.
 */
export function mailStatement(query: {
	producerId: string
	storeId: string
	range: StatementRange
	today: Day
	personId: string
	mailKey: string
}): Promise<Result<{ told: string[] }, { ok: false; reason: "nobody" | "too-long" }>> {
	const { producerId, storeId, range, personId, mailKey } = query
	return withProducer(producerId, async (tx) => {
		const people = await findStorePeople(tx, { producerId, storeId, kind: "invoices" })
		if (people.length === 0) return { ok: false, reason: "nobody" }
		const found = await readStatement(tx, { ...query, isWhole: true })
		if (found.lines.length > MOST_STATEMENT_LINES) return { ok: false, reason: "too-long" }
		const statement = statementDocument(found)
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
