import { run, type TaskList } from "graphile-worker"
import { closePool, createPool, pool } from "~/db/client.server"
import { env } from "~/platform/env.server"
import { log } from "~/platform/log.server"
import { closeMailer } from "~/platform/mailer.server"
import type { Task } from "./task.server"

/**
 * The worker: takes jobs from the queue until it is told to stop. Each handler is loaded when its first job comes, so
 * that starting is quick. Any number of workers may run; a job goes to one of them at a time, and may come again.
 */
const tasks: Record<string, () => Promise<{ default: Task }>> = {
	"apply-stripe-event": () => import("./apply-stripe-event.job.server"),
	"charge-due": () => import("./charge-due.job.server"),
	"chase-receivables": () => import("./chase-receivables.job.server"),
	"clear-expired": () => import("./clear-expired.job.server"),
	"free-stuck-jobs": () => import("./free-stuck-jobs.job.server"),
	"issue-month-ends": () => import("./issue-month-ends.job.server"),
	"make-standing-orders": () => import("./make-standing-orders.job.server"),
	"reconcile-stripe": () => import("./reconcile-stripe.job.server"),
	"refresh-expected": () => import("./refresh-expected.job.server"),
	"send-invoice-run": () => import("./send-invoice-run.job.server"),
	"send-mail": () => import("./send-mail.job.server"),
	"send-sign-in-mail": () => import("./send-sign-in-mail.job.server"),
	"sweep-due": () => import("./sweep-due.job.server"),
	"sweep-expected": () => import("./sweep-expected.job.server"),
	"sweep-month-ends": () => import("./sweep-month-ends.job.server"),
	"sweep-receivables": () => import("./sweep-receivables.job.server"),
	"sweep-standing-orders": () => import("./sweep-standing-orders.job.server"),
}

const everyMinute = ["free-stuck-jobs", "sweep-standing-orders"]
/** By the producer's own clock each does nothing before its hour. */
const everyHour = ["sweep-receivables"]
const everyNight = ["clear-expired", "sweep-expected", "sweep-month-ends"]

const taskList: TaskList = Object.fromEntries(
	Object.entries(tasks).map(([name, load]) => [
		name,
		async (payload: unknown) => {
			const started = performance.now()
			const { default: handle } = await load()
			await handle(payload)
			log.info({ job: name, ms: Math.round(performance.now() - started) }, "job done")
		},
	]),
)

const queuePool = createPool(env.DATABASE_URL, "waxbill_queue", 4)
const runner = await run({
	pgPool: queuePool,
	concurrency: 4,
	pollInterval: 1_000,
	noHandleSignals: true,
	taskList,
	crontab: [
		...everyMinute.map((name) => `* * * * * ${name} ?max=3`),
		...everyHour.map((name) => `11 * * * * ${name} ?max=3`),
		...everyNight.map((name) => `17 8 * * * ${name} ?max=3`),
		// In the morning of every zone of the country, so that a refusal is read on the day it is about.
		"23 13 * * * sweep-due ?max=3",
	].join("\n"),
})
runner.events.on("job:error", ({ job, error }) => {
	log.warn({ job: job.task_identifier, attempt: job.attempts, err: error }, "a job failed and is tried again later")
})
await pool().query("select 1")
log.info("worker is ready")
console.info("worker is ready")

let stopping = false
for (const signal of ["SIGINT", "SIGTERM"] as const) {
	process.on(signal, async () => {
		if (stopping) return
		stopping = true
		await runner.stop()
		closeMailer()
		await Promise.all([closePool(), queuePool.end()])
		process.exit(0)
	})
}
await runner.promise
