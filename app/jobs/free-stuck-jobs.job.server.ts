import { z } from "zod"
import { freeStuckJobs } from "~/services/queue/free-stuck-jobs.server"
import { task } from "./task.server"

export default task(z.unknown(), freeStuckJobs)
