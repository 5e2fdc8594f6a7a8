import { existsSync } from "node:fs"
import { join } from "node:path"
import { Worker } from "node:worker_threads"

type Answer = { id: number; bytes: Uint8Array<ArrayBuffer> } | { id: number; error: string }
type Waiting = { resolve: (bytes: Uint8Array<ArrayBuffer>) => void; reject: (error: Error) => void }
type Thread = { worker: Worker; waiting: Map<number, Waiting> }

const threads = new Map<string, Thread>()
let lastId = 0

/**
 * Hands `data` to one of the built programs of build/node, which runs in a thread that stays for the next, and answers the
 * bytes that it makes: for work that comes in thousands and would keep this thread from everything else. It does not keep
 * the process alive while nothing is asked of it. Throws what the program says; a thread that ends fails what it had in
 * hand, and the next asking starts another. Null where nothing has been built, as while developing.
 */
export function askThread(program: string, data: unknown): Promise<Uint8Array<ArrayBuffer>> | null {
	const path = join(process.cwd(), "build/node", `${program}.js`)
	const thread = threads.get(path) ?? (existsSync(path) ? start(path) : null)
	if (!thread) return null
	lastId += 1
	const id = lastId
	return new Promise((resolve, reject) => {
		thread.waiting.set(id, { resolve, reject })
		thread.worker.ref()
		thread.worker.postMessage({ id, data })
	})
}

function start(path: string): Thread {
	const thread: Thread = { worker: new Worker(path), waiting: new Map() }
	threads.set(path, thread)
	const end = (error: Error) => {
		if (threads.get(path) === thread) threads.delete(path)
		for (const { reject } of thread.waiting.values()) reject(error)
		thread.waiting.clear()
	}
	thread.worker.on("message", (answer: Answer) => {
		const asked = thread.waiting.get(answer.id)
		thread.waiting.delete(answer.id)
		if (thread.waiting.size === 0) thread.worker.unref()
		if ("bytes" in answer) asked?.resolve(answer.bytes)
		else asked?.reject(new Error(answer.error))
	})
	thread.worker.once("error", end)
	thread.worker.once("exit", (code) => end(new Error(`the thread of ${path} ended with ${code}`)))
	return thread
}
