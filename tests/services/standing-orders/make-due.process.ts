import { closePool } from "~/db/client.server"
import { makeDueOrders } from "~/services/standing-orders/make-due-orders.server"

/** A process of its own that makes the due orders of one producer: `make-due.process.ts <producer id> <instant>`. */
const [producerId = "", at = ""] = process.argv.slice(2)
await makeDueOrders({ producerId, now: new Date(at) })
await closePool()
