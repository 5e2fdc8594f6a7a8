import { z } from "zod"
import { chargeDue } from "~/services/payments/charge-due.server"
import { task } from "./task.server"

export default task(z.object({ producerId: z.uuid() }), chargeDue)
