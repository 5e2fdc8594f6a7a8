import { migrateDatabase } from "~/db/migrate.server"
import { run } from "./run"

await run(async () => {
	const url = process.env.DATABASE_URL
	if (!url) throw new Error("DATABASE_URL is missing: it names the database to migrate.")
	await migrateDatabase(url)
})
