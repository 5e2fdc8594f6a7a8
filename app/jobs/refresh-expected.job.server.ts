import { z } from "zod"
import { refreshTonight } from "~/services/crop/refresh-tonight.server"
import { task } from "./task.server"

export default task(z.object({ producerId: z.guid() }), refreshTonight)
