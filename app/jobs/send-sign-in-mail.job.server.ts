import { z } from "zod"
import { sendSignInMail } from "~/services/people/send-sign-in-mail.server"
import { task } from "./task.server"

export default task(z.object({ sealed: z.string() }), sendSignInMail)
