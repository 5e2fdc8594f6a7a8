import { randomUUID } from "node:crypto"
import { askDatabase } from "./desk-visits"

const producer = "(select id from producers where slug = 'larkmoor')"
const A_DAY = 86_400_000
const dayAt = (moment: number) => new Date(moment).toISOString().slice(0, 10)

/**
 * What a store that Larkmoor has just added still lacks for its account to be chased: someone who pays (an address that
 * signs in), and an invoice that fell due a week before `today` and one that is not due yet.
 */
export async function fillAccount(slug: string, email: string, today: Date) {
	await askDatabase("insert into users (email, name) values ($1, 'Wren Alder')", [email])
	await askDatabase(
		`insert into memberships (producer_id, user_id, role, store_id)
		select ${producer}, u.id, 'payer', s.id from users u, stores s where u.email = $1 and s.slug = $2`,
		[email, slug],
	)
	const late = dayAt(today.getTime() - 7 * A_DAY)
	const numbers = [
		await addInvoice(slug, late, 92_990),
		await addInvoice(slug, dayAt(today.getTime() + 9 * A_DAY), 40_010),
	]
	return { late, numbers: numbers as [string, string] }
}

async function addInvoice(slug: string, dueOn: string, cents: number): Promise<string> {
	const [made] = await askDatabase<{ number: string }>(
		`insert into invoices (producer_id, id, year, sequence, store_id, issued_on, due_on, lines_cents, delivery_cents, tax_cents,
			total_cents)
		select ${producer}, $1, 2002, (select coalesce(max(sequence), 0) + 1 from invoices where year = 2002), s.id, $3::date - 14,
			$3, $4, 0, 0, $4
		from stores s where s.slug = $2
		returning year || '-' || lpad(sequence::text, 4, '0') as number`,
		[randomUUID(), slug, dueOn, cents],
	)
	if (!made) throw new Error(`no store ${slug}`)
	return made.number
}

/** Queues at once what the worker looks at every hour. */
export const chase = () =>
	askDatabase(
		`select jobs.enqueue('chase-receivables', json_build_object('producerId', id, 'zone', time_zone), null, 'receivables:' || id)
		from producers where slug = 'larkmoor'`,
	)
