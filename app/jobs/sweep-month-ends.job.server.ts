import { z } from "zod"
import { sweepMonthEnds } from "~/services/queue/sweep-month-ends.server"
import { task } from "./task.server"

export default task(z.unknown(), sweepMonthEnds)
