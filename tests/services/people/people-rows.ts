import { randomUUID } from "node:crypto"
import pg from "pg"
import { memberships, priceTiers, producerSettings, producers, stores, users } from "~/db/schema"
import { withPlatform, withProducer } from "~/db/transaction.server"
import type { Role } from "~/domain/people/roles"
import { unseal } from "~/platform/secrets.server"
import type { SignInMail } from "~/services/people/send-sign-in-mail.server"
import { testDatabaseUrl } from "../../setup/test-database"

/** A person with an address that no other test uses. */
export async function addUser(name = "Rosa Fenn"): Promise<{ id: string; name: string; email: string }> {
	const email = `${randomUUID()}@pantryandplume.example.test`
	const [user] = await withPlatform((tx) => tx.insert(users).values({ name, email }).returning())
	if (!user) throw new Error("no user")
	return { id: user.id, name, email }
}

/** A producer with settings and one store. */
export async function addProducer() {
	const id = randomUUID()
	const slug = `yard-${id}`
	const storeId = randomUUID()
	const tierId = randomUUID()
	await withProducer(id, async (tx) => {
		await tx.insert(producers).values({ id, slug, name: "Larkmoor Bee Yard", timeZone: "America/Detroit" })
		await tx
			.insert(producerSettings)
			.values({ producerId: id, address: "Weld Lane, Teasel County", email: "orders@larkmoor.example.test" })
		await tx.insert(priceTiers).values({ producerId: id, id: tierId, name: "Shops" })
		await tx.insert(stores).values({ producerId: id, id: storeId, slug: "pantry", name: "Pantry & Plume", tierId })
	})
	return { id, slug, name: "Larkmoor Bee Yard", county: "", timeZone: "America/Detroit", storeId }
}

export async function addMembership(producerId: string, userId: string, role: Role, storeId: string | null = null) {
	const [row] = await withProducer(producerId, (tx) =>
		tx.insert(memberships).values({ producerId, userId, role, storeId }).returning({ id: memberships.id }),
	)
	if (!row) throw new Error("no membership")
	return row.id
}

/** Runs one statement as the login that owns the schema, past the rights of the product; row rules bind it all the same. */
export async function asOwner<Row extends pg.QueryResultRow>(text: string, values: unknown[] = []): Promise<Row[]> {
	return asOwnerOf(null, text, values)
}

/** The same on the rows of one producer. */
export async function asOwnerOf<Row extends pg.QueryResultRow>(
	producerId: string | null,
	text: string,
	values: unknown[] = [],
): Promise<Row[]> {
	const client = new pg.Client({ connectionString: testDatabaseUrl() })
	await client.connect()
	try {
		await client.query("select set_config('waxbill.producer_id', $1, false)", [producerId ?? ""])
		return (await client.query<Row>(text, values)).rows
	} finally {
		await client.end()
	}
}

/** The sign-in mails that wait for the worker, as the queue holds them, the oldest first. */
export async function queuedSealed(): Promise<{ sealed: string }[]> {
	const rows = await asOwner<{ payload: { sealed: string } }>(
		`select j.payload from graphile_worker._private_jobs j join graphile_worker._private_tasks t on t.id = j.task_id
		 where t.identifier = 'send-sign-in-mail' order by j.id`,
	)
	return rows.map(({ payload }) => payload)
}

/** What would be mailed to this address, the oldest first. */
export async function mailsTo(email: string): Promise<SignInMail[]> {
	const mails = (await queuedSealed()).map(({ sealed }) => unseal("sign-in-mail", sealed) as SignInMail)
	return mails.filter((mail) => mail.email === email)
}

/** The newest code and link for this address. Throws when none was made. */
export async function newestMail(email: string): Promise<SignInMail> {
	const mail = (await mailsTo(email)).at(-1)
	if (!mail) throw new Error("no mail waits for this address")
	return mail
}

/** The token at the end of a mailed link. */
export function tokenOf(link: string): string {
	return new URL(link).pathname.split("/").at(-1) ?? ""
}

/** How many sessions of the person are open. */
export async function openSessions(userId: string): Promise<number> {
	const [row] = await asOwner<{ count: string }>(
		"select count(*) from sessions where user_id = $1 and ended_at is null",
		[userId],
	)
	return Number(row?.count)
}
