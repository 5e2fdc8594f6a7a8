import { readFileSync } from "node:fs"
import { startMailSink } from "./mail-sink.mjs"
import { writePackedOrders } from "./packed-orders.mjs"

const AIM_PER_SECOND = 10
/** Flat: what one worker holds more at the end than after its first tenth, in megabytes. */
const AIM_MEGABYTES = 64
const LOOK_MS = 200
const DEADLINE_MS = 300_000
const TICKS_PER_SECOND = 100
const PAGE_BYTES = 4096
const MEGABYTE = 1_048_576

/**
 * Sends and invoices so many packed orders in one go, with one worker: from the moment it is asked for until the last
 * letter with its PDF is at the mail server. Says the rate, the processor time and the memory of the worker. A number
 * that is missing, or a letter without its PDF, makes it fail.
 */
export async function measureInvoices({ crew, database, env, count, say }) {
	const { client } = database
	const sink = await startMailSink(new URL(env.SMTP_URL).port)
	crew.onStop(sink.close)
	const { producerId } = await writePackedOrders(database, { count })
	await client.query("vacuum (analyze)")
	const quiet = { ...env, LOG_LEVEL: "warn" }
	const worker = crew.start("worker", process.execPath, ["build/node/worker.js"], { env: quiet })
	const runId = await startRun(client, producerId)
	const began = performance.now()
	const memory = []
	let issuedAfter = 0
	while (sink.counts.letters < count) {
		await new Promise((resolve) => setTimeout(resolve, LOOK_MS))
		const seconds = (performance.now() - began) / 1000
		if (seconds * 1000 > DEADLINE_MS) throw new Error(`Only ${sink.counts.letters} of ${count} letters went out.`)
		memory.push({ letters: sink.counts.letters, megabytes: megabytesOf(worker.pid) })
		if (issuedAfter === 0 && (await isFinished(client, runId))) issuedAfter = seconds
	}
	const seconds = (performance.now() - began) / 1000
	await mustBeWhole(client, { producerId, count, pdfs: sink.counts.pdfs })
	const shares = [0.1, 0.25, 0.5, 0.75, 1].map((share) => memory.find(({ letters }) => letters >= count * share))
	say(
		`The worker at a tenth, a quarter, a half, three quarters and the end: ${shares.map((at) => at?.megabytes.toFixed(0)).join(", ")} MB`,
	)
	const settled = memory.find(({ letters }) => letters >= count / 10)?.megabytes ?? 0
	const most = Math.max(...memory.filter(({ letters }) => letters >= count / 10).map(({ megabytes }) => megabytes))
	say(
		`${count} invoices: all issued after ${issuedAfter.toFixed(1)} s, all letters out after ${seconds.toFixed(1)} s; the worker took ${processorSeconds(worker.pid).toFixed(1)} s of processor and ${settled.toFixed(0)} to ${most.toFixed(0)} MB`,
	)
	const name = `Sending ${count} packed orders with invoice, PDF and letter, one worker`
	return [
		aimRow(name, "invoices a second", count / seconds, AIM_PER_SECOND, (ours, aim) => ours / aim),
		aimRow(
			name,
			"MB more after the first tenth",
			most - settled,
			AIM_MEGABYTES,
			(ours, aim) => aim / Math.max(ours, 1),
		),
	]
}

function aimRow(name, unit, measured, aim, ratioOf) {
	const ours = Number(measured.toPrecision(4))
	return { name, unit, ours, reference: aim, ratio: Math.round(ratioOf(ours, aim) * 1000) / 1000, floor: 1 }
}

/** Begins a run over all packed orders, as the desk does. */
async function startRun(client, producerId) {
	const { rows } = await client.query(
		`insert into invoice_runs (producer_id, started_by) select $1, user_id from memberships
		where producer_id = $1 and role = 'owner' returning id`,
		[producerId],
	)
	const runId = rows[0].id
	await client.query(
		`insert into invoice_run_orders (producer_id, run_id, order_id)
		select producer_id, $2, id from orders where producer_id = $1 and state = 'packed'`,
		[producerId, runId],
	)
	await client.query("select jobs.enqueue('send-invoice-run', $1::json)", [JSON.stringify({ producerId, runId })])
	return runId
}

async function isFinished(client, runId) {
	const { rows } = await client.query("select from invoice_runs where id = $1 and finished_at is not null", [runId])
	return rows.length > 0
}

async function mustBeWhole(client, { producerId, count, pdfs }) {
	const { rows } = await client.query(
		"select count(*)::int as count, max(sequence) as last from invoices where producer_id = $1",
		[producerId],
	)
	const { count: issued, last } = rows[0]
	if (issued !== count || last !== count || pdfs !== count)
		throw new Error(`${issued} invoices up to number ${last} and ${pdfs} PDFs, where ${count} were packed.`)
}

/** From /proc: field 24 of stat is the resident pages, 14 and 15 the processor time; the name before may hold blanks. */
const statOf = (pid) =>
	readFileSync(`/proc/${pid}/stat`, "utf8")
		.replace(/^.*\) /, "")
		.split(" ")
const megabytesOf = (pid) => (Number(statOf(pid)[21]) * PAGE_BYTES) / MEGABYTE
const processorSeconds = (pid) => (Number(statOf(pid)[11]) + Number(statOf(pid)[12])) / TICKS_PER_SECOND
