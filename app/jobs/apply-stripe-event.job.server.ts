import { z } from "zod"
import { applyStripeEvent } from "~/services/payments/apply-stripe-event.server"
import { task } from "./task.server"

export default task(z.object({ eventId: z.string().min(1) }), applyStripeEvent)
