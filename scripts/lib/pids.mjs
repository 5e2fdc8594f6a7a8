import { existsSync, readFileSync } from "node:fs"

/**
 * The moment a process began, in the kernel's ticks; undefined when it is gone. A number alone does not name a process,
 * since numbers are used again.
 */
export function beganAt(pid) {
	if (!existsSync("/proc/self/stat")) return isAlive(pid) ? "unknown" : undefined
	try {
		const stat = readFileSync(`/proc/${pid}/stat`, "utf8")
		// The program's name stands in brackets and may hold blanks; the fields count from behind it.
		const fields = stat.slice(stat.lastIndexOf(")") + 2).split(" ")
		return fields[0] === "Z" ? undefined : fields[19]
	} catch {
		return undefined
	}
}

/** Whether the process written down as `{ pid, began }` is still the one that runs under that number. */
export function isSame({ pid, began }) {
	return began !== undefined && beganAt(pid) === began
}

function isAlive(pid) {
	try {
		process.kill(pid, 0)
		return true
	} catch (error) {
		return error.code === "EPERM"
	}
}

/** Sends a signal to a process and all it started (its group); nothing happens when it is gone. */
export function signalGroup(pid, signal) {
	try {
		process.kill(-pid, signal)
	} catch (error) {
		if (error.code !== "ESRCH") throw error
	}
}
