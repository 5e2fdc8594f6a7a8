import { existsSync, readdirSync, rmSync } from "node:fs"
import { join } from "node:path"
import { removeCluster, startCluster } from "./cluster.mjs"
import { endLeftovers, isTaken } from "./crew.mjs"
import { workFolder } from "./paths.mjs"

const all = join(workFolder, "test")

/** The folder of this run of the tests: each has its own, so that several can run side by side. */
export const testFolder = join(all, String(process.pid))

/** Ends and removes what runs of the tests left that were killed. */
export async function clearDeadRuns() {
	for (const name of existsSync(all) ? readdirSync(all) : []) {
		const folder = join(all, name)
		if (isTaken(folder)) continue
		await endLeftovers(folder)
		removeCluster(join(folder, "pg"))
		rmSync(folder, { recursive: true, force: true })
	}
}

/** Starts a cluster that lives as long as this run. */
export async function startTestCluster(crew) {
	const cluster = await startCluster({ folder: join(testFolder, "pg"), throwaway: true })
	crew.onStop(cluster.remove)
	return cluster.url()
}

/** Removes what this run kept: its reports and logs. */
export function removeTestFolder() {
	rmSync(testFolder, { recursive: true, force: true })
}
