import { z } from "zod"
import { sweepStandingOrders } from "~/services/queue/sweep-standing-orders.server"
import { task } from "./task.server"

export default task(z.unknown(), sweepStandingOrders)
