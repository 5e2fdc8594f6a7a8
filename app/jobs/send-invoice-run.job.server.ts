import { z } from "zod"
import { sendInvoiceRun } from "~/services/invoicing/send-invoice-run.server"
import { task } from "./task.server"

export default task(z.object({ producerId: z.guid(), runId: z.guid() }), sendInvoiceRun)
