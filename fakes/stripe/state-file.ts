import { existsSync, readFileSync, renameSync, writeFileSync } from "node:fs"
import { dumpStore, loadStore, type Store } from "./store"

/** Fills `store` from `file` if it is there. Throws when the file is there and cannot be read as JSON. */
export function readStateFile(file: string, store: Store): void {
	if (existsSync(file)) loadStore(store, JSON.parse(readFileSync(file, "utf8")))
}

/** Writes `store` to `file` through a neighbour and a rename, so that a crash leaves the old state or the new one. */
export function writeStateFile(file: string, store: Store): void {
	const half = `${file}.writing`
	writeFileSync(half, JSON.stringify(dumpStore(store)), { mode: 0o600 })
	renameSync(half, file)
}
