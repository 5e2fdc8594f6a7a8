import { z } from "zod"
import { now } from "~/platform/clock.server"
import { remindCertificates } from "~/services/certificates/remind-certificates.server"
import { chargeOverdue } from "~/services/receivables/charge-overdue.server"
import { sendReminders } from "~/services/receivables/send-reminders.server"
import { task } from "./task.server"

/** Each of the three does once what it has to do, however often it is asked; a failure of one is tried again with all. */
export default task(z.object({ producerId: z.uuid(), zone: z.string() }), async ({ producerId, zone }) => {
	const at = now()
	await sendReminders({ producerId, now: at })
	await remindCertificates({ producerId, now: at, zone })
	await chargeOverdue({ producerId, now: at })
})
