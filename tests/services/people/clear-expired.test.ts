import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import { keptPosts, sessions, users } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"
import { clearExpired } from "~/services/people/clear-expired.server"
import { touchSession } from "~/services/people/touch-session.server"

const hour = 3_600_000
const inHours = (hours: number) => new Date(Date.now() + hours * hour)

test("what is past its time is cleared away, and what is not stays", async () => {
	await withPlatform(async (tx) => {
		const [person] = await tx.insert(users).values({ email: "old@example.test", name: "Old" }).returning()
		if (!person) throw new Error("an insert returns its row")
		await tx.insert(sessions).values([
			{ userId: person.id, tokenHash: "over", expiresAt: inHours(-1) },
			{ userId: person.id, tokenHash: "open", expiresAt: inHours(1) },
		])
		await tx.insert(keptPosts).values([
			{ id: randomUUID(), path: "/over", fields: [], expiresAt: inHours(-1) },
			{ id: randomUUID(), path: "/open", fields: [], expiresAt: inHours(1) },
		])
	})
	await clearExpired()
	await withPlatform(async (tx) => {
		expect((await tx.select().from(sessions)).map(({ tokenHash }) => tokenHash)).toEqual(["open"])
		expect((await tx.select().from(keptPosts)).map(({ path }) => path)).toEqual(["/open"])
	})
})

test("a session in use is seen later than before", async () => {
	const id = await withPlatform(async (tx) => {
		const [person] = await tx.insert(users).values({ email: "seen@example.test", name: "Seen" }).returning()
		if (!person) throw new Error("an insert returns its row")
		const [session] = await tx
			.insert(sessions)
			.values({ userId: person.id, tokenHash: "seen", expiresAt: inHours(1), lastSeenAt: inHours(-5) })
			.returning()
		return session?.id ?? ""
	})
	await touchSession(id)
	const [row] = await withPlatform((tx) => tx.select().from(sessions)).then((all) => all.filter((one) => one.id === id))
	expect(row?.lastSeenAt.getTime()).toBeGreaterThan(inHours(-1).getTime())
})
