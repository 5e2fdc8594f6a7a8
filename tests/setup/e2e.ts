import { spawn } from "node:child_process"
import { once } from "node:events"
import { createInterface } from "node:readline"
import { provideAddresses } from "./e2e-addresses"

/** Playwright's global setup: runs the built product until the tests are through. */
export default async function setup(): Promise<() => Promise<void>> {
	const stack = spawn(process.execPath, ["scripts/e2e-stack.mjs"], { stdio: ["ignore", "pipe", "inherit"] })
	const ended = once(stack, "exit")
	let isReady = false
	for await (const line of createInterface({ input: stack.stdout })) {
		isReady = line.startsWith("{")
		if (isReady) {
			provideAddresses(line)
			break
		}
		console.log(line)
	}
	stack.stdout.resume()
	if (!isReady) throw new Error("The product did not start; the reason stands above")
	return async () => {
		stack.kill("SIGTERM")
		await ended
	}
}
