import type { PoolClient, QueryConfig, QueryResult } from "pg"

/** More texts than this are not remembered: each prepared one takes room in every connection of every process. */
const MOST_TEXTS = 300

/** The name under which each text is prepared; null for one that has been run once so far. */
const names = new Map<string, string | null>()

/**
 * A connection for Drizzle that runs a statement that comes again as a prepared one: the database then parses and plans it
 * once for each connection, and not for each request. What is run only once stays as it is. A statement whose tables
 * change meanwhile is planned anew; only one that answers `*` would fail, so statements name their columns.
 */
export function preparing(client: PoolClient): PoolClient {
	const query = (config: QueryConfig, values?: unknown[]): Promise<QueryResult> =>
		client.query({ ...config, name: nameOf(config.text) }, values)
	return { query } as unknown as PoolClient
}

function nameOf(text: string): string | undefined {
	const name = names.get(text)
	if (name) return name
	if (name === undefined) {
		if (names.size < MOST_TEXTS) names.set(text, null)
		return undefined
	}
	const made = `again_${[...names.keys()].indexOf(text)}`
	names.set(text, made)
	return made
}
