import { closePool } from "~/db/client.server"
import { seedDemo } from "~/services/demo/seed-demo.server"

await seedDemo()
await closePool()
