import cluster from "node:cluster"
import { createServer } from "node:http"
import type { Express } from "express"
import { log } from "./log.server"

const DRAIN_MS = 10_000
const RESTART_PAUSE_MS = 1_000

/**
 * Runs `start` in `count` processes that share one port; with one, in this process itself. A process that ends by itself
 * is replaced after a moment; on SIGTERM or SIGINT all are asked to stop, and this one ends when they have.
 */
export function inProcesses(count: number, start: () => void): void {
	if (count === 1 || cluster.isWorker) {
		start()
		return
	}
	let isStopping = false
	for (let made = 0; made < count; made += 1) cluster.fork()
	cluster.on("exit", (worker, code, signal) => {
		if (isStopping) return
		log.error({ child: worker.process.pid, code, signal }, "a web process ended by itself and is replaced")
		setTimeout(() => !isStopping && cluster.fork(), RESTART_PAUSE_MS)
	})
	onStopSignal(() => {
		isStopping = true
		for (const worker of Object.values(cluster.workers ?? {})) worker?.process.kill("SIGTERM")
	})
}

/**
 * Listens, and on SIGTERM or SIGINT stops cleanly: takes no new connections, lets requests finish for up to ten seconds,
 * then runs `close` and ends the process. A port that cannot be had is one plain sentence and exit code 1.
 */
export function listen(app: Express, place: { host: string; port: number }, close: () => Promise<void>): void {
	const server = createServer(app)
	server.on("error", (error: NodeJS.ErrnoException) => {
		const why = error.code === "EADDRINUSE" ? "another program has it" : error.message
		console.error(`The web server cannot listen on ${place.host}, port ${place.port}: ${why}.`)
		process.exit(1)
	})
	server.listen(place.port, place.host, () => log.info(place, "listening"))
	onStopSignal(() => {
		log.info("stopping")
		const tooLate = setTimeout(() => {
			log.warn("requests were cut off at the deadline")
			server.closeAllConnections()
		}, DRAIN_MS)
		server.close(async () => {
			clearTimeout(tooLate)
			await close().catch((error: unknown) => log.error({ err: error }, "the pool did not close"))
			process.exit(0)
		})
		server.closeIdleConnections()
	})
}

function onStopSignal(stop: () => void): void {
	let isFirst = true
	for (const signal of ["SIGTERM", "SIGINT"] as const) {
		process.on(signal, () => {
			if (isFirst) stop()
			isFirst = false
		})
	}
}
