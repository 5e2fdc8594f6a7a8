import { readFileSync } from "node:fs"
import { expect, it } from "vitest"
import { expectedVersion, readiness } from "~/platform/health.server"

it("the process is ready when the database has this code's schema, or a newer one", async () => {
	expect(await readiness(async () => 20, 20)).toEqual({ ready: true })
	expect(await readiness(async () => 21, 20)).toEqual({ ready: true })
})

it("it is not while the schema is behind or missing", async () => {
	expect(await readiness(async () => 19, 20)).toEqual({ ready: false, reason: "schema-behind" })
	expect(await readiness(async () => undefined, 20)).toEqual({ ready: false, reason: "schema-behind" })
})

it("it is not while the database is away or does not answer", async () => {
	const away = async () => {
		throw new Error("connect ECONNREFUSED")
	}
	expect(await readiness(away, 20)).toEqual({ ready: false, reason: "database-away" })
	expect(await readiness(() => new Promise(() => {}), 20, 10)).toEqual({ ready: false, reason: "database-away" })
})

it("this code's version is that of the last migration in the journal", () => {
	const journal = JSON.parse(readFileSync(new URL("../../../drizzle/meta/_journal.json", import.meta.url), "utf8"))
	expect(expectedVersion).toBe(journal.entries.at(-1).when)
})
