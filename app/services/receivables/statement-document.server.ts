import { ageingBuckets } from "~/domain/invoicing/ageing"
import { AGEING_HEADS } from "~/domain/receivables/ageing-words"
import { entryWords } from "~/domain/receivables/entry-words"
import { effectOf } from "~/domain/receivables/statement"
import { letterHead } from "~/services/producers/find-yard.server"
import type { StatementProps } from "~emails/documents/statement-props"
import type { Statement } from "./find-statement.server"

/** A whole statement as its printed pages and its letter take it. */
export function statementDocument(statement: Statement): StatementProps {
	const { yard, store, range, broughtForwardCents, lines, closingCents, ageing, onAccountCents } = statement
	return {
		yard: letterHead(yard),
		store: { name: store.name, address: store.address || null },
		range,
		broughtForwardCents,
		lines: lines.map((line) => ({
			on: line.on,
			...entryWords(line),
			amountCents: effectOf(line),
			balanceCents: line.balanceCents,
		})),
		closingCents,
		ageing: ageingBuckets.map((bucket) => ({ label: AGEING_HEADS[bucket], cents: ageing[bucket] })),
		onAccountCents,
	}
}
