import { randomUUID } from "node:crypto"
import { readProducer } from "~/db/transaction.server"
import { addDays, dayInZone } from "~/domain/calendar"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { readLoggerFile } from "~/services/cold-room/read-logger-file.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { findBackwardTrace } from "~/services/trace/find-backward-trace.server"
import { findForwardTrace } from "~/services/trace/find-forward-trace.server"
import { medianOfAsync } from "./timing"

const ZONE = "America/Chicago"
const RUNS = 15
const READINGS = 1_000_000
const MINUTE = 60_000
const MEGABYTE = 1_048_576

type Seasons = { producerId: string; lot: string }

/** Milliseconds at the median, by service call: free to promise for all products on each day of 26 weeks, and traces. */
export async function measureSeasons({ producerId, lot }: Seasons) {
	const today = dayInZone(new Date(), ZONE)
	const days = Array.from({ length: 26 * 7 }, (_, index) => addDays(today, index))
	const promise = await medianOfAsync(RUNS, async () => {
		const outlooks = await readProducer(producerId, (tx) => findOutlooks(tx, { producerId, today }))
		for (const outlook of outlooks.values()) freeToPromise({ ...outlook, days })
	})
	const forward = await medianOfAsync(RUNS, async () => {
		const trace = await findForwardTrace({ producerId, code: lot })
		if (!trace || trace.orders.length === 0) throw new Error(`lot ${lot} has gone nowhere`)
	})
	const backward = await medianOfAsync(RUNS, () => findBackwardTrace({ producerId, code: lot, zone: ZONE }))
	return { promise, forward, backward }
}

/**
 * Reads a logger file of a million lines as an upload is read, and answers how long it took, in milliseconds, and how much
 * more memory the process held at most, in megabytes; the lines are made as they are read.
 */
export async function measureLogger({
	producerId,
	personId,
	load,
}: {
	producerId: string
	personId: string
	load: number
}) {
	const now = new Date()
	const start = now.getTime() - (READINGS + 60) * MINUTE
	const before = process.memoryUsage().rss
	let most = before
	const watch = setInterval(() => {
		most = Math.max(most, process.memoryUsage().rss)
	}, 20)
	const began = performance.now()
	const answer = await readLoggerFile({
		producerId,
		personId,
		zone: ZONE,
		number: load,
		proofId: randomUUID(),
		probe: "comb",
		unit: "C",
		dates: null,
		fileName: "bench.csv",
		content: linesFrom(start),
		now,
	})
	const ms = performance.now() - began
	clearInterval(watch)
	if (!answer.ok) throw new Error(`the logger file was refused: ${answer.reason}`)
	return { ms, megabytes: (Math.max(most, process.memoryUsage().rss) - before) / MEGABYTE }
}

async function* linesFrom(start: number): AsyncGenerator<Uint8Array> {
	yield Buffer.from("Time,Temperature (C)\n")
	for (let first = 0; first < READINGS; first += 1000) {
		const lines = Array.from({ length: 1000 }, (_, index) => {
			const at = new Date(start + (first + index) * MINUTE).toISOString()
			return `${at},${(-20 + (index % 40) / 10).toFixed(1)}\n`
		})
		yield Buffer.from(lines.join(""))
		await new Promise((resolve) => setImmediate(resolve))
	}
}
