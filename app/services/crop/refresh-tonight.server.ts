import { sql } from "drizzle-orm"
import { withProducer } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { refreshExpected } from "./refresh-expected.server"

/**
 * Works out anew what should come off a producer's hives, though nothing was noted: days that have passed without a
 * super coming off move on, and the forecast of the day is kept.
 */
export function refreshTonight({ producerId }: { producerId: string }): Promise<void> {
	return withProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ zone: string }>(
			sql`select time_zone as zone from producers where id = ${producerId}`,
		)
		if (rows[0]) await refreshExpected(tx, { producerId, today: dayInZone(now(), rows[0].zone) })
	})
}
