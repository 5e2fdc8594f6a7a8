import { z } from "zod"
import { reconcileStripe } from "~/services/payments/reconcile-stripe.server"
import { task } from "./task.server"

export default task(z.unknown(), reconcileStripe)
