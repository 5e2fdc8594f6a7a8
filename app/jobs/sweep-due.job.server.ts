import { z } from "zod"
import { sweepDue } from "~/services/payments/sweep-due.server"
import { task } from "./task.server"

export default task(z.unknown(), sweepDue)
