import { z } from "zod"
import { issueMonthEnds } from "~/services/invoicing/issue-together.server"
import { task } from "./task.server"

export default task(z.object({ producerId: z.guid() }), issueMonthEnds)
