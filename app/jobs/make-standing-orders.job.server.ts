import { z } from "zod"
import { now } from "~/platform/clock.server"
import { makeDueOrders } from "~/services/standing-orders/make-due-orders.server"
import { task } from "./task.server"

export default task(z.object({ producerId: z.uuid() }), async ({ producerId }) => {
	await makeDueOrders({ producerId, now: now() })
})
