import { z } from "zod"
import { sweepExpected } from "~/services/queue/sweep-expected.server"
import { task } from "./task.server"

export default task(z.unknown(), sweepExpected)
