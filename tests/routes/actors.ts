import { createHash, randomBytes, randomUUID } from "node:crypto"
import type pg from "pg"
import { asProducer, type Yard } from "./yard"

/** Who asks: nobody, everyone at our yard and store, the same roles at another yard, and another store of ours. */
export const ACTORS = [
	{ name: "nobody" },
	{ name: "owner", role: "owner", at: "ours" },
	{ name: "desk hand", role: "desk", at: "ours" },
	{ name: "packer", role: "packer", at: "ours" },
	{ name: "stall volunteer", role: "stall", at: "ours" },
	{ name: "buyer", role: "buyer", at: "ours" },
	{ name: "payer", role: "payer", at: "ours" },
	{ name: "buyer of another store", role: "buyer", at: "our other store" },
	{ name: "payer of another store", role: "payer", at: "our other store" },
	{ name: "owner elsewhere", role: "owner", at: "theirs" },
	{ name: "desk hand elsewhere", role: "desk", at: "theirs" },
	{ name: "packer elsewhere", role: "packer", at: "theirs" },
	{ name: "stall volunteer elsewhere", role: "stall", at: "theirs" },
	{ name: "buyer elsewhere", role: "buyer", at: "theirs" },
	{ name: "payer elsewhere", role: "payer", at: "theirs" },
] as const

export type Actor = (typeof ACTORS)[number]
export type ActorName = Actor["name"]

export type Cast = {
	/** A cookie of a session of its own for each request, since a request may end it; empty for nobody. */
	cookieOf: (actor: ActorName) => Promise<string>
	leave: () => Promise<void>
}

/** Gives every actor a person and their one role, and the stall volunteer the yard's market day. */
export async function hireCast(owner: pg.Client, yard: Yard): Promise<Cast> {
	const people = new Map<ActorName, string>()
	const memberships: { producerId: string; id: string }[] = []
	for (const actor of ACTORS) {
		if (!("role" in actor)) continue
		const userId = randomUUID()
		people.set(actor.name, userId)
		const email = `walk-${actor.name.replaceAll(" ", "-")}-${userId}@example.test`
		await owner.query("insert into users (id, email, name) values ($1, $2, $3)", [userId, email, actor.name])
		const producerId = actor.at === "theirs" ? yard.theirs.producerId : yard.ours.producerId
		const stores = { ours: yard.ours.storeId, "our other store": yard.ours.otherStoreId, theirs: yard.theirs.storeId }
		const storeId = actor.role === "buyer" || actor.role === "payer" ? stores[actor.at] : null
		const id = randomUUID()
		await asProducer(owner, producerId, async () => {
			await owner.query(
				"insert into memberships (producer_id, id, user_id, role, store_id) values ($1, $2, $3, $4, $5)",
				[producerId, id, userId, actor.role, storeId],
			)
			if (actor.name !== "stall volunteer") return
			await owner.query("insert into market_day_people (producer_id, market_day_id, user_id) values ($1, $2, $3)", [
				producerId,
				yard.ours.marketDayId,
				userId,
			])
		})
		memberships.push({ producerId, id })
	}
	return {
		cookieOf: async (actor) => {
			const userId = people.get(actor)
			if (!userId) return ""
			const token = randomBytes(32).toString("base64url")
			const hash = createHash("sha256").update(token).digest("hex")
			await owner.query(
				"insert into sessions (user_id, token_hash, expires_at) values ($1, $2, now() + interval '1 hour')",
				[userId, hash],
			)
			return `waxbill-session=${token}`
		},
		leave: async () => {
			for (const { producerId, id } of memberships) {
				await asProducer(owner, producerId, async () => {
					await owner.query("delete from market_day_people where producer_id = $1 and market_day_id = $2", [
						producerId,
						yard.ours.marketDayId,
					])
					await owner.query("delete from memberships where producer_id = $1 and id = $2", [producerId, id])
				})
			}
			await owner.query("delete from sessions where user_id = any($1)", [[...people.values()]])
		},
	}
}

/**
 * What a policy, named by its words, does with an actor who asks for a page of our yard and store. Source: design.md,
 * "Sign-in and roles"; unknown and foreign names are 404, which tells nothing.
 */
export function verdict(policy: string, actor: Actor): "admitted" | "sign-in" | 403 | 404 {
	if (["anyone", "visitor", "signer"].includes(policy)) return "admitted"
	if (!("role" in actor)) return "sign-in"
	if (policy === "signed-in") return "admitted"
	const isBuyer = actor.role === "buyer" || actor.role === "payer"
	if (policy === "any-buyer") return isBuyer && actor.at !== "theirs" ? "admitted" : 404
	const [kind, roles] = policy === "stall" ? ["desk", "owner, desk, stall"] : policy.split(": ")
	if (roles === undefined || (kind !== "desk" && kind !== "store")) throw new Error(`no such policy: ${policy}`)
	if (actor.at !== "ours" || isBuyer !== (kind === "store")) return 404
	return roles.split(", ").includes(actor.role) ? "admitted" : 403
}
