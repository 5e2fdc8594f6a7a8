import { spawn, spawnSync } from "node:child_process"
import { root } from "./paths.mjs"
import { signalGroup } from "./pids.mjs"
import { refuse } from "./say.mjs"

/** Runs a program to its end without showing it; answers its exit code and what it wrote. */
export function quietly(program, args, options = {}) {
	const done = spawnSync(program, args, { cwd: root, encoding: "utf8", ...options })
	const output = `${done.stdout ?? ""}${done.stderr ?? ""}`.trim() || done.error?.message || ""
	return { ok: done.status === 0, output, stdout: done.stdout ?? "" }
}

// Each in a group of its own, so that Ctrl-C reaches this script alone and a stop reaches all that a program started.
const running = new Set()

/** Ends the programs that `visibly` is waiting for, for a stop in the middle of one. */
export function endCommands() {
	for (const child of running) signalGroup(child.pid, "SIGTERM")
}

/** Runs a program to its end with its output on the terminal; answers its exit code (1 when a signal ended it). */
export function visibly(program, args, options = {}) {
	return new Promise((resolve, reject) => {
		const child = spawn(program, args, {
			cwd: root,
			stdio: ["ignore", "inherit", "inherit"],
			detached: true,
			...options,
		})
		running.add(child)
		child.once("error", (error) => {
			running.delete(child)
			reject(error)
		})
		child.once("close", (code) => {
			running.delete(child)
			resolve(code ?? 1)
		})
	})
}

/** Runs a program to its end, showing its output only when it fails: then `sentence` and the end of the output. */
export async function orRefuse(sentence, program, args, options = {}) {
	const lines = []
	const code = await new Promise((resolve) => {
		const child = spawn(program, args, { cwd: root, stdio: ["ignore", "pipe", "pipe"], detached: true, ...options })
		running.add(child)
		const keep = (chunk) => lines.push(chunk)
		child.stdout.on("data", keep)
		child.stderr.on("data", keep)
		child.once("error", (error) => lines.push(Buffer.from(String(error.message))))
		child.once("close", (status) => {
			running.delete(child)
			resolve(status ?? 1)
		})
	})
	const output = Buffer.concat(lines).toString("utf8").trim()
	if (code !== 0) refuse(`${sentence}\n${output.split("\n").slice(-30).join("\n")}`)
	return output
}
