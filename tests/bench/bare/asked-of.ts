import { createHash } from "node:crypto"
import pg from "pg"
import type { Asked } from "./read-rows"

const TOKEN = /(?:^|; )waxbill-session=([\w-]+)/

type Address = { producer?: string | undefined; store?: string | undefined; day?: string | undefined }

/** Whose sheet a request asks for; null where it names none or carries no session. */
export function askedOf({ producer, store, day }: Address, cookie: string | null | undefined): Asked | null {
	const [, token] = TOKEN.exec(cookie ?? "") ?? []
	if (!producer || !store || !day || !token) return null
	const tokenHash = createHash("sha256").update(token).digest("hex")
	return { tokenHash, producerSlug: producer, storeSlug: store, day, now: new Date() }
}

/** As many connections as the product has, in the same role. */
export function openPool(): pg.Pool {
	return new pg.Pool({ connectionString: process.env.DATABASE_URL, options: "-c role=waxbill_app", max: 10 })
}
