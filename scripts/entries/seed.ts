import { mkdir, writeFile } from "node:fs/promises"
import { closePool } from "~/db/client.server"
import { seedDemo } from "~/services/demo/seed-demo.server"
import { run } from "./run"

/** Writes the demo data, where they are missing, and the list of people to sign in as for the scripts to print. */
await run(async () => {
	const people = await seedDemo()
	await mkdir(".waxbill", { recursive: true })
	const list = people.map(({ name, email, role, path }) => ({ name, email, role, url: path }))
	await writeFile(".waxbill/demo-people.json", `${JSON.stringify(list, null, "\t")}\n`)
	await closePool()
})
