import { existsSync } from "node:fs"
import { join } from "node:path"
import { Worker } from "node:worker_threads"

/** One at a time in a process: whoever asks for long work while some is done waits for it. */
let before: Promise<unknown> = Promise.resolve()

/**
 * Runs one of the built programs of build/node in a thread of its own with `data`, and answers the bytes that it posts, so
 * that other pages do not wait for long work. Null where nothing has been built, as while developing.
 */
export function runApart(program: string, data: unknown): Promise<Uint8Array<ArrayBuffer>> | null {
	const path = join(process.cwd(), "build/node", `${program}.js`)
	if (!existsSync(path)) return null
	const mine = before.then(() => inThread(path, data))
	before = mine.catch(() => undefined)
	return mine
}

function inThread(path: string, data: unknown): Promise<Uint8Array<ArrayBuffer>> {
	return new Promise((resolve, reject) => {
		const thread = new Worker(path, { workerData: data })
		thread.once("message", (bytes: Uint8Array<ArrayBuffer>) => resolve(bytes))
		thread.once("error", reject)
		thread.once("exit", (code) => reject(new Error(`the thread of ${path} ended with ${code} and no answer`)))
	})
}
