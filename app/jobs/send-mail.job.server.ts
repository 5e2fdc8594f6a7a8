import { z } from "zod"
import { sendQueuedMail } from "~/services/mail/send-queued-mail.server"
import { task } from "./task.server"

export default task(z.object({ producerId: z.uuid(), mailId: z.uuid() }), sendQueuedMail)
