import type { DatabaseError } from "pg"

/** The database's own error behind what Drizzle throws (it wraps them), or null. */
function databaseErrorOf(error: unknown): DatabaseError | null {
	for (let e = error; e instanceof Error; e = e.cause) {
		if ("code" in e && "severity" in e) return e as DatabaseError
	}
	return null
}

/** Whether `error` is a breach of the named constraint (unique, check, foreign key). */
export function breaksConstraint(error: unknown, constraint: string): boolean {
	return databaseErrorOf(error)?.constraint === constraint
}

/** Whether running the same transaction again may succeed: a deadlock, or two that could not be put in an order. */
export function isWorthRepeating(error: unknown): boolean {
	const code = databaseErrorOf(error)?.code
	return code === "40P01" || code === "40001"
}
