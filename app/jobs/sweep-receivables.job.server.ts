import { z } from "zod"
import { sweepReceivables } from "~/services/queue/sweep-receivables.server"
import { task } from "./task.server"

export default task(z.unknown(), sweepReceivables)
