import { and, eq } from "drizzle-orm"
import { freezerLoads } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import {
	coolingAllowance,
	type FreezeVerdict,
	type ProbePlace,
	type TemperatureUnit,
} from "~/domain/cold-room/freezing"
import { LoggerReader, type LoggerReading, type LoggerRefusal } from "~/domain/cold-room/logger-reader"
import { concludeLogger } from "~/domain/cold-room/logger-report"
import { shiftDaysOf, wallOfMoment } from "~/domain/cold-room/wall-clock"
import type { Result } from "~/domain/result"
import { lockLoad, writeProof } from "./write-proof.server"

export type LoggerFile = {
	producerId: string
	personId: string
	/** The producer's zone, for times that name none. */
	zone: string
	number: number
	/** Made with the form: a second send of it changes nothing. */
	proofId: string
	probe: ProbePlace
	/** What the person says where the file does not. */
	unit: TemperatureUnit | null
	dates: "month-first" | "day-first" | null
	fileName: string
	content: AsyncIterable<Uint8Array>
	now: Date
}

export type LoggerFileAnswer = Result<{ verdict: FreezeVerdict }, LoggerRefusal | { ok: false; reason: "no-such-load" }>

const LONGEST_NAME = 120

/**
 * Reads a logger file for a load while it comes in, judges it, and keeps what it showed, whether or not it proves the
 * treatment: the findings and the curve, not the file. Only readings from the loading on count. No transaction is open
 * while the file comes in. Nothing is written when the file is refused.
 */
export async function readLoggerFile(file: LoggerFile): Promise<LoggerFileAnswer> {
	const loadedAt = await findLoadedAt(file)
	if (!loadedAt) return { ok: false, reason: "no-such-load" }
	const reading = await readThrough(file, loadedAt)
	if (!reading.ok) return reading
	const { verdict, run, report, curve } = concludeLogger(reading, file)
	return withProducer(file.producerId, async (tx): Promise<LoggerFileAnswer> => {
		const load = await lockLoad(tx, file)
		if (!load) return { ok: false, reason: "no-such-load" }
		const proof = {
			producerId: file.producerId,
			id: file.proofId,
			loadId: load.id,
			kind: "logger" as const,
			isAccepted: verdict.isProven,
			rowTenthsC: verdict.row.tenthsC,
			requiredMinutes: verdict.row.minutes,
			heldMinutes: verdict.countedMinutes,
			allowanceMinutes: coolingAllowance(file.probe),
			runFrom: run && new Date(run.from),
			runTo: run && new Date(run.to),
			fileName: file.fileName.slice(-LONGEST_NAME),
			report,
			curve,
			enteredBy: file.personId,
		}
		await writeProof(tx, proof, file.now)
		return { ok: true, verdict }
	})
}

async function findLoadedAt({ producerId, number }: LoggerFile): Promise<Date | null> {
	const [load] = await readProducer(producerId, (tx) =>
		tx
			.select({ loadedAt: freezerLoads.loadedAt })
			.from(freezerLoads)
			.where(and(eq(freezerLoads.producerId, producerId), eq(freezerLoads.number, number))),
	)
	return load?.loadedAt ?? null
}

async function readThrough(file: LoggerFile, loadedAt: Date): Promise<LoggerReading | LoggerRefusal> {
	const { zone, unit, dates, now } = file
	const moments = { from: loadedAt.getTime(), to: now.getTime() }
	const wall = { from: wallOfMoment(moments.from, zone), to: wallOfMoment(moments.to, zone) }
	const reader = new LoggerReader({ unit, dates, counts: { moments, wall }, isShiftDay: shiftDaysOf(zone) })
	// What comes after a refusal is let through unread: a browser that is cut off while sending shows no answer at all.
	for await (const text of textOf(file.content)) reader.feed(text)
	return reader.finish()
}

/** Decodes bytes as UTF-8, or as UTF-16 where the file begins with that mark. A sign that is neither becomes U+FFFD. */
async function* textOf(content: AsyncIterable<Uint8Array>): AsyncGenerator<string> {
	let decoder: TextDecoder | null = null
	for await (const piece of content) {
		decoder ??= new TextDecoder(piece[0] === 0xff && piece[1] === 0xfe ? "utf-16le" : "utf-8")
		yield decoder.decode(piece, { stream: true })
	}
	yield decoder?.decode() ?? ""
}
