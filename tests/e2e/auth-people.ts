import { randomUUID } from "node:crypto"
import pg from "pg"
import { e2eAddresses } from "../setup/e2e-addresses"

/** Writes a person of their own for a test, with one role at Larkmoor: limits count by address, so none is shared. */
export async function addPerson(name: string, role: "owner" | "packer"): Promise<{ name: string; email: string }> {
	const email = `${randomUUID()}@larkmoor.example.test`
	const client = new pg.Client({ connectionString: e2eAddresses().databaseUrl })
	await client.connect()
	try {
		await client.query("begin")
		await client.query(
			"select set_config('waxbill.producer_id', (select id::text from producers where slug = 'larkmoor'), true)",
		)
		await client.query(
			`with person as (insert into users (email, name) values ($1, $2) returning id)
			 insert into memberships (producer_id, user_id, role) select p.id, person.id, $3 from producers p, person
			 where p.slug = 'larkmoor'`,
			[email, name, role],
		)
		await client.query("commit")
	} finally {
		await client.end()
	}
	return { name, email }
}
