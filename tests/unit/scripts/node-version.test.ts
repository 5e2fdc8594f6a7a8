import { expect, it } from "vitest"
import { startNode } from "../../setup/run-script"

const older = (version: string) =>
	`data:text/javascript,Object.defineProperty(process,"versions",{value:{node:"${version}"}})`

it.each(["start", "test", "dev", "reset", "build", "serve"])(
	"%s says in one sentence that Node is too old",
	async (name) => {
		const script = startNode(["--import", older("18.19.0"), `scripts/${name}.mjs`])
		expect(await script.ended).toBe(1)
		expect(script.output()).toBe("Waxbill needs Node.js 20.19 or newer, and this is 18.19.0: install a newer one.\n")
	},
)

it.each([
	["20.18.9", 1],
	["20.19.0", 0],
	["22.0.0", 0],
])("Node %s ends with %i", async (version, code) => {
	const script = startNode(["--import", older(version), "scripts/lib/node-version.mjs"])
	expect(await script.ended).toBe(code)
})
