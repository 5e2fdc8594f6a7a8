import { spawn } from "node:child_process"
import { closeSync, existsSync, mkdirSync, openSync, readFileSync, renameSync, rmSync, writeFileSync } from "node:fs"
import { join, relative } from "node:path"
import { endCommands } from "./commands.mjs"
import { root } from "./paths.mjs"
import { beganAt, isSame, signalGroup } from "./pids.mjs"
import { explain, Refusal, refuse, say } from "./say.mjs"

const DEADLINE_MS = 15_000
const STOPPED_BY_SIGNAL = 130

/**
 * The processes that one script keeps running, and what else must be undone when it ends. They are written down in
 * `folder`/run.json, so that the next script in the same folder can end what a killed one left running.
 */
class Crew {
	#children = []
	#undo = []
	#stopping
	#end
	#taken = false
	/** Settles when the crew must stop: rejects when a member ended by itself, resolves at a signal. */
	ended = new Promise((resolve, reject) => {
		this.#end = { resolve, reject }
	})

	constructor(folder) {
		this.folder = folder
		// A rejection before anybody waits is looked at later, by supervise.
		this.ended.catch(() => {})
	}

	/** Starts a program that should run until the crew stops; its output goes to a log file, or to `onLine` line by line. */
	start(name, program, args, { env, onLine } = {}) {
		if (this.#stopping) throw new Refusal("Stopping.")
		const log = join(this.folder, "log", `${name.replaceAll(" ", "-")}.log`)
		mkdirSync(join(log, ".."), { recursive: true })
		const file = openSync(log, "w")
		const output = onLine ? "pipe" : file
		// A group of its own: Ctrl-C on the terminal reaches this script alone, which then stops all in good order.
		const child = spawn(program, args, { cwd: root, env, detached: true, stdio: ["ignore", output, output] })
		closeSync(file)
		if (onLine) for (const stream of [child.stdout, child.stderr]) eachLine(stream, onLine)
		const exited = new Promise((resolve) => {
			child.once("error", (error) => resolve(error.message))
			child.once("exit", (code, signal) => resolve(signal ? `signal ${signal}` : `exit code ${code}`))
		})
		const member = { name, pid: child.pid, began: child.pid && beganAt(child.pid), exited, log, over: false }
		this.#children.push(member)
		this.#writeDown()
		exited.then((how) => {
			member.over = true
			if (this.#stopping) return
			const end = onLine ? "" : `\nThe end of its log, ${relative(root, log)}:\n${lastLines(log)}`
			this.#end.reject(new Refusal(`The ${name} ended by itself (${how}), so everything was stopped.${end}`))
		})
		return member
	}

	/** Remembers what to undo when the crew stops, last things first. */
	onStop(undo) {
		this.#undo.push(undo)
	}

	interrupt() {
		endCommands()
		this.#end.resolve(STOPPED_BY_SIGNAL)
	}

	/** Stops the members, the last started first, then undoes the rest. Safe to call again. */
	stop() {
		this.#stopping ??= this.#stop()
		return this.#stopping
	}

	async #stop() {
		// Once more round, as a step that was under way may have finished and left something to undo.
		await new Promise((resolve) => setImmediate(resolve))
		for (const member of this.#children.toReversed()) await endMember(member)
		for (const undo of this.#undo.toReversed()) await undo()
		if (this.#taken) rmSync(join(this.folder, "run.json"), { force: true })
	}

	#writeDown() {
		const children = this.#children.map(({ name, pid, began }) => ({ name, pid, began }))
		const file = join(this.folder, "run.json")
		writeFileSync(`${file}.new`, JSON.stringify({ pid: process.pid, began: beganAt(process.pid), children }))
		renameSync(`${file}.new`, file)
	}

	/** Takes the folder for this script, after ending what a killed one left; refuses while another script has it. */
	async take() {
		mkdirSync(this.folder, { recursive: true })
		const before = readRun(this.folder)
		if (before && isSame(before))
			refuse(`Waxbill runs from this folder already (process ${before.pid}): stop that first.`)
		await endLeftovers(this.folder)
		this.#taken = true
		this.#writeDown()
	}
}

async function endMember(member) {
	if (!member.pid || member.over) return
	signalGroup(member.pid, "SIGTERM")
	const late = setTimeout(() => signalGroup(member.pid, "SIGKILL"), DEADLINE_MS)
	await member.exited
	clearTimeout(late)
	// Whatever it had started and did not take along.
	signalGroup(member.pid, "SIGKILL")
}

function readRun(folder) {
	const file = join(folder, "run.json")
	return existsSync(file) ? JSON.parse(readFileSync(file, "utf8")) : undefined
}

/** Whether a script that is alive has taken `folder`. */
export function isTaken(folder) {
	const run = readRun(folder)
	return run !== undefined && isSame(run)
}

/** Ends the processes that a killed script in `folder` left running. */
export async function endLeftovers(folder) {
	for (const child of readRun(folder)?.children ?? []) {
		for (let tries = 0; isSame(child) && tries < 100; tries += 1) {
			signalGroup(child.pid, tries < 50 ? "SIGTERM" : "SIGKILL")
			await new Promise((resolve) => setTimeout(resolve, 100))
		}
	}
}

function eachLine(stream, onLine) {
	let rest = ""
	stream.setEncoding("utf8").on("data", (text) => {
		const lines = (rest + text).split("\n")
		rest = lines.pop()
		for (const line of lines) onLine(line)
	})
}

function lastLines(file) {
	return readFileSync(file, "utf8").trim().split("\n").slice(-15).join("\n")
}

/**
 * Runs `work(crew)` with a crew in `folder`, and ends the process when it is through: with the exit code that `work`
 * answers (0 for none), 1 after an error, which is explained in a sentence. Whatever the end, a signal included, all that
 * was started is stopped first. `work` waits for `crew.ended` to go on running; `signalCode` is the exit code of a signal;
 * `withParent` stops the crew also when the process that started this one is gone.
 */
export async function supervise(folder, work, { signalCode = STOPPED_BY_SIGNAL, withParent = false } = {}) {
	const crew = new Crew(folder)
	let interrupted = false
	const interrupt = () => {
		if (!interrupted) crew.interrupt()
		interrupted = true
	}
	for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, interrupt)
	// npm tells its shell to end, not the program in it: that is noticed by the parent being gone.
	const parent = process.ppid
	if (withParent || process.env.npm_lifecycle_event)
		setInterval(() => process.ppid !== parent && interrupt(), 250).unref()
	// A terminal that was closed takes no more words, which must not keep anything from being stopped.
	for (const stream of [process.stdout, process.stderr]) stream.on("error", () => {})
	let code
	try {
		await crew.take()
		code = (await Promise.race([work(crew), crew.ended])) ?? 0
		if (interrupted) code = signalCode
	} catch (error) {
		code = interrupted ? signalCode : 1
		if (!interrupted) explain(error)
	}
	if (interrupted) say("Stopping")
	await crew.stop()
	process.exit(code)
}
