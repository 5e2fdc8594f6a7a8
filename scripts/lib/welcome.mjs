import { existsSync, readFileSync } from "node:fs"
import { join } from "node:path"
import { root, workFolder } from "./paths.mjs"
import { say } from "./say.mjs"

/** Prints where everything is, whom the demo knows, and how to stop. */
export function welcome({ ports, dataFolder }) {
	const people = demoPeople()
	const local = (port) => `http://127.0.0.1:${port}`
	say()
	say("Waxbill is running.")
	say(`  The product       ${local(ports.web)}`)
	say(`  Its mail          ${local(ports.mail)}   (sign-in codes arrive here)`)
	say(`  The payment fake  ${local(ports.stripe)}`)
	if (people.length > 0) {
		say()
		say("Sign in as one of the demo people; the code comes by mail:")
		const width = Math.max(...people.map((person) => person.email.length))
		for (const { name, role, email, url } of people) {
			say(`  ${name}, ${role}`)
			say(`    ${email.padEnd(width)}  ${local(ports.web)}${url}`)
		}
	}
	say()
	say(`Ctrl-C stops all of it. Logs are in .waxbill/log.`)
	if (dataFolder) say(`The data stay in ${dataFolder.replace(`${root}/`, "")}; npm run reset begins anew.`)
}

function demoPeople() {
	const file = join(workFolder, "demo-people.json")
	return existsSync(file) ? JSON.parse(readFileSync(file, "utf8")) : []
}
