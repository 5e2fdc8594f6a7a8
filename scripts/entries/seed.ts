import { closePool } from "~/db/client.server"
import { seedDemo } from "~/services/demo/seed-demo.server"
import { run } from "./run"

await run(async () => {
	await seedDemo()
	await closePool()
})
