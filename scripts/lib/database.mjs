import { join } from "node:path"
import { startCluster } from "./cluster.mjs"
import { workFolder } from "./paths.mjs"

const FIRST_PORT = 3004

/** Reads .env, if there is one; what is set already stays as it is. */
export function readDotenv() {
	try {
		process.loadEnvFile(".env")
	} catch (error) {
		if (error.code !== "ENOENT") throw error
	}
}

/**
 * The database to use, as `{ url, folder }`: that of DATABASE_URL, or this checkout's own cluster, which stops along with
 * the crew and keeps its data in `folder`.
 */
export async function chosenDatabase(crew) {
	const given = process.env.DATABASE_URL?.trim()
	if (given) return { url: given }
	const cluster = await startCluster({ folder: join(workFolder, "pg"), firstPort: FIRST_PORT })
	crew.onStop(cluster.stop)
	return { url: cluster.url(), folder: cluster.folder }
}
