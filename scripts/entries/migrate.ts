import { migrateDatabase } from "~/db/migrate.server"

const url = process.env.DATABASE_URL
if (!url) {
	console.error("DATABASE_URL is missing: it names the database to migrate.")
	process.exit(1)
}
await migrateDatabase(url)
