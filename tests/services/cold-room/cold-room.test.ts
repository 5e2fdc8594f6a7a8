import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { breaksConstraint } from "~/db/errors.server"
import { lotLinks, netChecks } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { streamUpload, UploadCut } from "~/platform/upload-stream.server"
import { enterTreatment } from "~/services/cold-room/enter-treatment.server"
import { findLoad } from "~/services/cold-room/find-load.server"
import { findReleaseState } from "~/services/cold-room/find-release-state.server"
import { listLoads } from "~/services/cold-room/list-loads.server"
import { readLoggerFile } from "~/services/cold-room/read-logger-file.server"
import { releaseByHand, releaseLot } from "~/services/cold-room/release-lot.server"
import { startLoad } from "~/services/cold-room/start-load.server"
import { addHand, addLot } from "../desk/desk-steps"
import { addProduct, openYard, THURSDAY, type Yard, ZONE } from "../orders/place-yard"

const LOADED_AT = new Date("2026-08-12T18:00:00Z")
const HOUR = 3_600_000

async function openColdRoom() {
	const yard = await openYard()
	const personId = await addHand()
	const productId = await addProduct(yard, { code: "11", readyCases: 0 })
	const lot = (code: string, coldRoom = 24) =>
		addLot(yard, { productId, code, bestBeforeOn: "2027-07-01", coldRoom, state: "held" })
	return { yard, personId, productId, lot }
}

type Room = Awaited<ReturnType<typeof openColdRoom>>

async function loadOf({ yard, personId }: Room, ...loaded: [lotId: string, pieces: number][]) {
	const answer = await startLoad({
		producerId: yard.producerId,
		personId,
		loadId: randomUUID(),
		freezer: "Chest freezer",
		loadedAt: LOADED_AT,
		now: THURSDAY,
		lots: loaded.map(([lotId, pieces]) => ({ lotId, pieces })),
	})
	if (!answer.ok) throw new Error(`not loaded: ${answer.reason}`)
	return answer.number
}

const enter = ({ yard, personId }: Room, number: number, minutes: number, temperature = -16) =>
	enterTreatment({
		producerId: yard.producerId,
		personId,
		number,
		proofId: randomUUID(),
		temperature,
		unit: "C",
		minutes,
		probe: "comb",
		note: "",
		now: THURSDAY,
	})

const stateOf = (yard: Yard, lotId: string) =>
	withProducer(yard.producerId, (tx) => findReleaseState(tx, { producerId: yard.producerId, lotId }))

/** A check of the net contents; only whether it passed matters here. */
async function weigh({ yard, personId }: Room, lotId: string, hasPassed: boolean) {
	await withProducer(yard.producerId, (tx) =>
		tx.insert(netChecks).values({
			producerId: yard.producerId,
			lotId,
			checkedOn: "2026-08-13",
			input: {} as never,
			worksheet: {} as never,
			hasPassed,
			checkedBy: personId,
		}),
	)
}

async function* piecesOf(text: string, length = 1000) {
	const bytes = new TextEncoder().encode(text)
	for (let from = 0; from < bytes.length; from += length) yield bytes.subarray(from, from + length)
}

const logger = ({ yard, personId }: Room, number: number, text: string) => ({
	producerId: yard.producerId,
	personId,
	zone: ZONE,
	number,
	proofId: randomUUID(),
	probe: "comb" as const,
	unit: null,
	dates: null,
	fileName: "freezer 7.csv",
	content: piecesOf(text),
	now: THURSDAY,
})

/** Five-minute readings on the yard's own clock, from 2 pm of August 12. */
function loggerText(temperatures: readonly number[]): string {
	const from = Date.UTC(2026, 7, 12, 14)
	const rows = temperatures.map((t, index) => `${new Date(from + index * 300_000).toISOString().slice(0, 16)},${t}`)
	return `Time,Temp (°C)\n${rows.join("\n")}\n`
}

describe("a load of the freezer", () => {
	test("is numbered on, lists what lies in it, and takes its lots off those that wait", async () => {
		const room = await openColdRoom()
		const [first, second] = [await room.lot("A-1"), await room.lot("A-2", 12)]
		expect(await loadOf(room, [first, 24])).toBe(1)
		expect(await loadOf(room, [second, 5])).toBe(2)
		const { loads, held } = await listLoads({ producerId: room.yard.producerId, after: null })
		expect(loads.map(({ number, lotCodes, pieces, provenAt }) => ({ number, lotCodes, pieces, provenAt }))).toEqual([
			{ number: 2, lotCodes: ["A-2"], pieces: 5, provenAt: null },
			{ number: 1, lotCodes: ["A-1"], pieces: 24, provenAt: null },
		])
		expect(held.map(({ code, piecesOnShelves, piecesLoaded }) => [code, piecesOnShelves, piecesLoaded])).toEqual([
			["A-2", 12, 5],
			["A-1", 24, 24],
		])
	})

	test("is made once, however often and however closely its form is sent", async () => {
		const room = await openColdRoom()
		const lotId = await room.lot("A-1")
		const form = {
			producerId: room.yard.producerId,
			personId: room.personId,
			loadId: randomUUID(),
			freezer: "Chest",
			loadedAt: LOADED_AT,
			now: THURSDAY,
			lots: [{ lotId, pieces: 24 }],
		}
		const answers = await Promise.all([startLoad(form), startLoad(form), startLoad(form)])
		expect(answers).toEqual(Array(3).fill({ ok: true, number: 1 }))
		expect(await loadOf(room, [lotId, 1])).toBe(2)
	})

	test("refuses more pieces than there are, lots that are not held, and hours to come; nothing is written", async () => {
		const room = await openColdRoom()
		const held = await room.lot("A-1")
		const released = await addLot(room.yard, {
			productId: room.productId,
			code: "R-1",
			bestBeforeOn: "2027-07-01",
			coldRoom: 12,
		})
		const form = {
			producerId: room.yard.producerId,
			personId: room.personId,
			loadId: randomUUID(),
			freezer: "Chest",
			loadedAt: LOADED_AT,
			now: THURSDAY,
		}
		const lotsAsked = [
			{ lotId: held, pieces: 25 },
			{ lotId: released, pieces: 1 },
		]
		expect(await startLoad({ ...form, lots: lotsAsked })).toEqual({
			ok: false,
			reason: "lots",
			refused: [
				{ lotId: held, why: "too-many", piecesThere: 24 },
				{ lotId: released, why: "not-held", piecesThere: 12 },
			],
		})
		expect(await startLoad({ ...form, lots: [] })).toEqual({ ok: false, reason: "nothing-loaded" })
		const tomorrow = new Date(THURSDAY.getTime() + 24 * HOUR)
		expect(await startLoad({ ...form, loadedAt: tomorrow, lots: [{ lotId: held, pieces: 1 }] })).toMatchObject({
			reason: "in-the-future",
		})
		expect((await listLoads({ producerId: room.yard.producerId, after: null })).loads).toEqual([])
	})
})

describe("a treatment", () => {
	test("read off a thermometer proves the load at the table's hours, and not a minute before", async () => {
		const room = await openColdRoom()
		const number = await loadOf(room, [await room.lot("A-1"), 24])
		expect(await enter(room, number, 119)).toMatchObject({ ok: true, verdict: { isProven: false, missingMinutes: 1 } })
		const before = await findLoad({ producerId: room.yard.producerId, number })
		expect(before).toMatchObject({ provenAt: null, proofs: [{ isAccepted: false, heldMinutes: 119 }] })
		expect(await enter(room, number, 120)).toMatchObject({ ok: true, verdict: { isProven: true } })
		const after = await findLoad({ producerId: room.yard.producerId, number })
		expect(after).toMatchObject({ provenAt: THURSDAY })
		// Both were entered at one moment of the test's clock, so their order says nothing.
		expect(after?.proofs.map(({ isAccepted }) => isAccepted).toSorted()).toEqual([false, true])
	})

	test("cannot be longer than the load has been in", async () => {
		const room = await openColdRoom()
		const number = await loadOf(room, [await room.lot("A-1"), 24])
		expect(await enter(room, number, 25 * 60)).toEqual({
			ok: false,
			reason: "longer-than-in",
			mostMinutes: 24 * 60 + 15,
		})
		expect(await enter(room, 99, 60)).toEqual({ ok: false, reason: "no-such-load" })
	})

	test("from a logger is judged as it comes in, by the yard's own clock, and its curve is kept", async () => {
		const room = await openColdRoom()
		const number = await loadOf(room, [await room.lot("A-1"), 24])
		const temperatures = [...Array(24).fill(-3), ...Array(37).fill(-12.4), ...Array(10).fill(-2)]
		const answer = await readLoggerFile(logger(room, number, loggerText(temperatures)))
		expect(answer).toMatchObject({ ok: true, verdict: { isProven: true, row: { tenthsC: -120 }, countedMinutes: 180 } })
		const load = await findLoad({ producerId: room.yard.producerId, number })
		expect(load?.proofs[0]).toMatchObject({
			kind: "logger",
			isAccepted: true,
			fileName: "freezer 7.csv",
			runFrom: new Date("2026-08-12T20:00:00Z"),
			runTo: new Date("2026-08-12T23:00:00Z"),
			report: { readings: 71, unit: "C", gaps: { count: 0 } },
		})
		expect(load?.curve?.buckets[0]).toEqual([LOADED_AT.getTime(), -30, -30])
		expect(load?.curve?.buckets).toHaveLength(71)
	})

	test("from a file that cannot be read writes nothing", async () => {
		const room = await openColdRoom()
		const number = await loadOf(room, [await room.lot("A-1"), 24])
		const mixed = "Time,Temp (°C)\n2026-08-12T14:00,-16\n2026-08-12T14:05,3 °F\n"
		expect(await readLoggerFile(logger(room, number, mixed))).toMatchObject({
			ok: false,
			reason: "mixed-units",
			row: 3,
		})
		expect(await readLoggerFile(logger(room, number, "PK\u0003\u0004\0\0"))).toEqual({ ok: false, reason: "binary" })
		expect((await findLoad({ producerId: room.yard.producerId, number }))?.proofs).toEqual([])
	})

	test("is kept once when its form is sent twice", async () => {
		const room = await openColdRoom()
		const number = await loadOf(room, [await room.lot("A-1"), 24])
		const file = logger(room, number, loggerText(Array(30).fill(-20)))
		await readLoggerFile(file)
		await readLoggerFile({ ...file, content: piecesOf(loggerText(Array(30).fill(-20))) })
		expect((await findLoad({ producerId: room.yard.producerId, number }))?.proofs).toHaveLength(1)
	})
})

describe("the release of a lot", () => {
	const release = ({ yard, personId }: Room, code: string) =>
		releaseLot({ producerId: yard.producerId, personId, code })

	test("says what is missing until it is frozen and weighed, then releases it once", async () => {
		const room = await openColdRoom()
		const lotId = await room.lot("A-1")
		expect(await release(room, "A-1")).toEqual({ ok: false, reason: "missing", missing: ["freezing", "weighing"] })
		const number = await loadOf(room, [lotId, 24])
		expect(await stateOf(room.yard, lotId)).toMatchObject({ openLoads: [number], proof: null, piecesFrozen: 0 })
		await enter(room, number, 130)
		await weigh(room, lotId, false)
		expect(await release(room, "A-1")).toEqual({ ok: false, reason: "missing", missing: ["weighing"] })
		await weigh(room, lotId, true)
		const both = await Promise.all([release(room, "A-1"), release(room, "A-1")])
		expect(both).toEqual([{ ok: true }, { ok: true }])
		const state = await stateOf(room.yard, lotId)
		expect(state).toMatchObject({ missing: [], release: { kind: "proven", who: "Ida" }, proof: { loadNumber: number } })
		const { rows } = await withProducer(room.yard.producerId, (tx) =>
			tx.execute<{ action: string }>(sql`
				select action from audit_entries where producer_id = ${room.yard.producerId} and subject_id = ${lotId}`),
		)
		expect(rows).toEqual([{ action: "lot released" }])
	})

	test("waits until as many pieces were frozen as lie on the shelves", async () => {
		const room = await openColdRoom()
		const lotId = await room.lot("A-1")
		await weigh(room, lotId, true)
		await enter(room, await loadOf(room, [lotId, 10]), 130)
		expect(await stateOf(room.yard, lotId)).toMatchObject({
			missing: ["freezing"],
			piecesFrozen: 10,
			piecesOnShelves: 24,
		})
		await enter(room, await loadOf(room, [lotId, 14]), 130)
		expect((await stateOf(room.yard, lotId)).missing).toEqual([])
	})

	test("takes the freezing of the lot that it was split from, and its own weighing", async () => {
		const room = await openColdRoom()
		const { producerId } = room.yard
		const parent = await room.lot("A-1", 40)
		await enter(room, await loadOf(room, [parent, 40]), 130)
		const child = await room.lot("A-1b", 12)
		await withProducer(producerId, (tx) =>
			tx.insert(lotLinks).values({
				producerId,
				fromLotId: parent,
				toLotId: child,
				kind: "split",
				pieces: 12,
				piecesMade: 12,
				at: new Date(THURSDAY.getTime() + HOUR),
			}),
		)
		expect(await stateOf(room.yard, child)).toMatchObject({ missing: ["weighing"], piecesFrozen: 12 })
	})

	test("by hand needs a reason that stands on the lot", async () => {
		const room = await openColdRoom()
		const lotId = await room.lot("A-1")
		const byHand = (reason: string) =>
			releaseByHand({ producerId: room.yard.producerId, personId: room.personId, code: "A-1", reason })
		expect(await byHand("   ok now   ")).toEqual({ ok: false, reason: "reason-too-short" })
		expect(await byHand(" The notebook has two nights at 0 °F. ")).toEqual({ ok: true })
		expect((await stateOf(room.yard, lotId)).release).toMatchObject({
			kind: "by-hand",
			reason: "The notebook has two nights at 0 °F.",
		})
	})

	test("is refused for a lot that was withdrawn or is not there", async () => {
		const room = await openColdRoom()
		const lotId = await room.lot("A-1")
		await withProducer(room.yard.producerId, (tx) =>
			tx.execute(
				sql`update lots set state = 'withdrawn' where producer_id = ${room.yard.producerId} and id = ${lotId}`,
			),
		)
		expect(await release(room, "A-1")).toEqual({ ok: false, reason: "withdrawn" })
		expect(await release(room, "no such")).toEqual({ ok: false, reason: "no-such-lot" })
	})

	test("cannot be had past its record: the database refuses a state that no release stands for", async () => {
		const room = await openColdRoom()
		const lotId = await room.lot("A-1")
		const error = await withProducer(room.yard.producerId, (tx) =>
			tx.execute(sql`update lots set state = 'released' where producer_id = ${room.yard.producerId} and id = ${lotId}`),
		).catch((reason: unknown) => reason)
		expect(breaksConstraint(error, "lots_released_with_proof")).toBe(true)
	})
})

describe("a form with a file, as it comes in", () => {
	const form = (file: Blob, name = "log.csv") => {
		const data = new FormData()
		data.set("probe", "comb")
		data.set("note", "zwölf\r\nlines")
		data.set("file", file, name)
		return new Request("http://desk.example.test/", { method: "POST", body: data })
	}
	const textOf = async (content: AsyncIterable<Uint8Array>) => {
		const parts: Uint8Array[] = []
		for await (const piece of content) parts.push(piece)
		return Buffer.concat(parts).toString()
	}

	test("gives the fields first and then the bytes, whole", async () => {
		const text = Array.from({ length: 50_000 }, (_, index) => `row ${index}\r\n--not a boundary\r\n`).join("")
		const upload = await streamUpload(form(new Blob([text]), '../x "y".csv'), { mostBytes: 10_000_000 })
		expect(upload?.fields).toEqual({ probe: "comb", note: "zwölf\r\nlines" })
		expect(upload && (await textOf(upload.content))).toBe(text)
	})

	test("stops at the limit, and when it is broken off", async () => {
		const upload = await streamUpload(form(new Blob(["x".repeat(200_000)])), { mostBytes: 100_000 })
		await expect(upload && textOf(upload.content)).rejects.toEqual(new UploadCut("too-large"))
		const whole = form(new Blob(["x".repeat(200_000)]))
		const cut = new Request(whole.url, {
			method: "POST",
			headers: whole.headers,
			body: Buffer.from(await whole.arrayBuffer()).subarray(0, 150_000),
		})
		const half = await streamUpload(cut, { mostBytes: 1_000_000 })
		await expect(half && textOf(half.content)).rejects.toEqual(new UploadCut("broken-off"))
	})

	test("is none when it is another kind of post or has no file", async () => {
		const url = "http://desk.example.test/"
		expect(
			await streamUpload(new Request(url, { method: "POST", body: new URLSearchParams("a=1") }), { mostBytes: 9 }),
		).toBeNull()
		const empty = new FormData()
		empty.set("a", "1")
		expect(await streamUpload(new Request(url, { method: "POST", body: empty }), { mostBytes: 9 })).toBeNull()
	})
})
