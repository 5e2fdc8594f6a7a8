import { type ChildProcess, spawn } from "node:child_process"
import { once } from "node:events"

export type RunningScript = {
	process: ChildProcess
	/** All that it has written so far, to either stream. */
	output: () => string
	/** Resolves when the output matches; rejects when the script ends before. */
	says: (pattern: RegExp) => Promise<void>
	/** Resolves with the exit code, or the signal, when it has ended. */
	ended: Promise<number | NodeJS.Signals>
}

/** Starts Node with these arguments in the checkout; `env` is added to an environment without the product's variables. */
export function startNode(args: readonly string[], env: Record<string, string> = {}): RunningScript {
	const child = spawn(process.execPath, args, {
		env: { PATH: process.env.PATH, HOME: process.env.HOME, ...env },
		stdio: ["ignore", "pipe", "pipe"],
	})
	let output = ""
	for (const stream of [child.stdout, child.stderr]) {
		stream.setEncoding("utf8").on("data", (text: string) => {
			output += text
			child.emit("said")
		})
	}
	const ended = once(child, "close").then(([code, signal]) => (code ?? signal) as number | NodeJS.Signals)
	const says = (pattern: RegExp) =>
		new Promise<void>((resolve, reject) => {
			const look = () => pattern.test(output) && resolve()
			child.on("said", look)
			child.once("close", () => reject(new Error(`It ended without saying ${pattern}:\n${output}`)))
			look()
		})
	return { process: child, output: () => output, says, ended }
}

/** Starts `code` as a module that may import scripts as "./scripts/…". */
export function startModule(code: string, env: Record<string, string> = {}): RunningScript {
	return startNode(["--input-type=module", "--eval", code], env)
}
