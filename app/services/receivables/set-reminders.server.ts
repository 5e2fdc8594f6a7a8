import { and, eq } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { auditEntries, producerSettings, reminderSteps } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { FIRST_STEPS } from "~/domain/receivables/reminders"
import type { Result } from "~/domain/result"

type By = { producerId: string; personId: string }
type StepWords = { daysAfterDue: number; subject: string; body: string; isActive: boolean }

const record = (tx: Tx, by: By, action: string, subjectId: string, detail: Record<string, unknown>) =>
	tx.insert(auditEntries).values({
		producerId: by.producerId,
		userId: by.personId,
		action,
		subjectType: "reminders",
		subjectId,
		detail,
	})

/** Turns all reminders on or off. Recorded. */
export function switchReminders(query: By & { on: boolean }): Promise<void> {
	const { producerId, on } = query
	return withProducer(producerId, async (tx) => {
		await tx.update(producerSettings).set({ remindersOn: on }).where(eq(producerSettings.producerId, producerId))
		await record(tx, query, on ? "reminders on" : "reminders off", producerId, {})
	})
}

/** Takes the steps that are offered, beside those that are there already: a day that has one keeps it. Recorded. */
export function takeFirstSteps(query: By): Promise<void> {
	const { producerId } = query
	return withProducer(producerId, async (tx) => {
		await tx
			.insert(reminderSteps)
			.values(FIRST_STEPS.map((step) => ({ producerId, ...step })))
			.onConflictDoNothing()
		await record(tx, query, "first reminders taken", producerId, {})
	})
}

/**
 * Writes a step of the schedule: a new one where `id` is none of the schedule yet, made with the form so that it is written
 * once. Refused when the schedule has another step on that day. Recorded.
 */
export async function saveReminderStep(
	query: By & { id: string; step: StepWords },
): Promise<Result<object, { ok: false; reason: "day-taken" }>> {
	const { producerId, id, step } = query
	try {
		return await withProducer(producerId, async (tx) => {
			const isStep = and(eq(reminderSteps.producerId, producerId), eq(reminderSteps.id, id))
			const [before] = await tx.select().from(reminderSteps).where(isStep).for("update")
			if (before) await tx.update(reminderSteps).set(step).where(isStep)
			else await tx.insert(reminderSteps).values({ producerId, id, ...step })
			await record(tx, query, before ? "reminder changed" : "reminder added", id, { before, after: step })
			return { ok: true }
		})
	} catch (error) {
		if (breaksConstraint(error, "reminder_steps_day_once")) return { ok: false, reason: "day-taken" }
		throw error
	}
}

/** Sets the monthly charge on what is overdue; 0 basis points is none. Recorded. */
export function setFinanceCharge(query: By & { basisPoints: number; afterDays: number }): Promise<void> {
	const { producerId, basisPoints, afterDays } = query
	return withProducer(producerId, async (tx) => {
		await tx
			.update(producerSettings)
			.set({ financeChargeBasisPoints: basisPoints, financeChargeAfterDays: afterDays })
			.where(eq(producerSettings.producerId, producerId))
		await record(tx, query, "finance charge set", producerId, { basisPoints, afterDays })
	})
}
