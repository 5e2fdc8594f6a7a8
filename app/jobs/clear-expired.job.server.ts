import { z } from "zod"
import { clearExpired } from "~/services/people/clear-expired.server"
import { task } from "./task.server"

export default task(z.unknown(), clearExpired)
