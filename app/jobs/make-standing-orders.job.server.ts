import { z } from "zod"
import { now } from "~/platform/clock.server"
import { makeDueOrders } from "~/services/standing-orders/make-due-orders.server"
import { remindDates } from "~/services/standing-orders/remind-dates.server"
import { task } from "./task.server"

export default task(z.object({ producerId: z.uuid() }), async ({ producerId }) => {
	const at = now()
	await makeDueOrders({ producerId, now: at })
	await remindDates({ producerId, now: at })
})
