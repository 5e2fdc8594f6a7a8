import { execFile } from "node:child_process"
import { cp, mkdir, mkdtemp, rm, writeFile } from "node:fs/promises"
import { tmpdir } from "node:os"
import { dirname, join, resolve } from "node:path"
import { pathToFileURL } from "node:url"
import { afterAll, beforeAll, describe, expect, test } from "vitest"

/** One breach of a rule: `file` has `code` in it. */
type Breach = { rule: string; file: string; code: string }

/** What stands in the sound tree that the breaches are planted in; files of the layers that others may import. */
const SOUND: Record<string, string> = {
	"app/domain/rule.ts": 'import { add } from "dinero.js"\nexport const rule = add',
	"app/db/tables.server.ts": 'import { rule } from "~/domain/rule"\nexport const tables = rule',
	"app/platform/clock.server.ts": "export const now = () => new Date()",
	"app/services/do-it.server.ts":
		'import { tables } from "~/db/tables.server"\nimport { Letter } from "~emails/letter"\nexport const doIt = [tables, Letter]',
	"app/routes/page.tsx":
		'import { doIt } from "~/services/do-it.server"\nimport { Part } from "~/ui/part"\nimport { data } from "react-router"\nexport const loader = [doIt, Part, data]',
	"app/jobs/task.server.ts": 'import { doIt } from "~/services/do-it.server"\nexport const task = doIt',
	"app/ui/part.tsx": 'import { rule } from "~/domain/rule"\nexport const Part = rule',
	"emails/letter.tsx": 'import { rule } from "~/domain/rule"\nexport const Letter = rule',
	"fakes/fake.ts": "export const fake = 1",
	"tests/helper.ts": 'import { doIt } from "~/services/do-it.server"\nexport const helper = doIt',
}

const PACKAGES = ["dinero.js", "drizzle-orm", "pg", "stripe", "react-router"]

const breach = (rule: string, folder: string, imported: string, kind = ""): Breach => ({
	rule,
	file: `${folder}/${imported.replaceAll(/\W+/g, "-")}${kind}.ts`,
	code:
		kind === "-type"
			? `import type * as bad from "${imported}"\nexport type Bad = typeof bad`
			: `export * from "${imported}"`,
})

/** At least one breach of every rule; where a rule names several folders or packages, one of each. */
const BREACHES: Breach[] = [
	breach("domain-is-pure", "app/domain", "~/db/tables.server"),
	breach("domain-is-pure", "app/domain", "~/db/tables.server", "-type"),
	breach("domain-is-pure", "app/domain", "~/ui/part"),
	breach("domain-is-pure", "app/domain", "drizzle-orm"),
	breach("domain-is-pure", "app/domain", "node:fs"),
	{
		rule: "domain-reaches-no-database",
		file: "app/domain/first-step.ts",
		code: 'export * from "../../tests/second-step"',
	},
	breach("db-knows-no-use-case", "app/db", "~/services/do-it.server"),
	breach("db-knows-no-use-case", "app/db", "~emails/letter"),
	breach("platform-knows-no-use-case", "app/platform", "~/services/do-it.server"),
	breach("services-know-no-edge", "app/services", "~/routes/page"),
	breach("services-know-no-edge", "app/services", "~/jobs/task.server"),
	breach("services-know-no-edge", "app/services", "~/ui/part"),
	breach("services-know-no-edge", "app/services", "react-router"),
	breach("services-know-no-edge", "app/services", "../../fakes/fake"),
	breach("routes-call-services", "app/routes", "~/db/tables.server"),
	breach("routes-call-services", "app/routes", "~/jobs/task.server"),
	breach("routes-call-services", "app/routes", "drizzle-orm"),
	breach("routes-call-services", "app/routes", "pg"),
	breach("routes-call-services", "app/routes", "stripe"),
	breach("routes-call-services", "app/routes", "../../tests/helper"),
	breach("jobs-call-services", "app/jobs", "~/routes/page"),
	breach("jobs-call-services", "app/jobs", "~/ui/part"),
	breach("ui-knows-no-server", "app/ui", "~/platform/clock.server"),
	breach("ui-knows-no-server", "app/ui", "~/services/do-it.server", "-type"),
	breach("ui-knows-no-server", "app/ui", "~/routes/page"),
	breach("emails-know-domain-only", "emails", "~/services/do-it.server"),
	breach("emails-know-domain-only", "emails", "~/ui/part"),
	{ rule: "nothing-circular", file: "app/ui/about.ts", code: 'export * from "./round"' },
	breach("everything-resolves", "app/ui", "./no-such-file"),
]

/** What a breach needs besides its own file. */
const SUPPORTS: Record<string, string> = {
	"tests/second-step.ts": 'export * from "~/db/tables.server"',
	"app/ui/round.ts": 'export * from "./about"',
}

type Violation = { rule: { name: string }; from: string }

let folder = ""
beforeAll(async () => {
	folder = await mkdtemp(join(tmpdir(), "waxbill-imports-"))
})
afterAll(() => rm(folder, { recursive: true }))

/** Writes `files` into a folder of their own, with the checkout's rules beside them, and answers what breaks a rule. */
async function violationsIn(name: string, files: Record<string, string>): Promise<Violation[]> {
	const root = join(folder, name)
	for (const [file, code] of Object.entries(files)) {
		await mkdir(dirname(join(root, file)), { recursive: true })
		await writeFile(join(root, file), code)
	}
	for (const file of [".dependency-cruiser.mjs", "tsconfig.json"]) await cp(file, join(root, file))
	for (const pack of PACKAGES) {
		await mkdir(join(root, "node_modules", pack), { recursive: true })
		await writeFile(join(root, "node_modules", pack, "index.js"), "export {}")
		await writeFile(
			join(root, "node_modules", pack, "package.json"),
			`{"name":"${pack}","type":"module","main":"index.js"}`,
		)
	}
	await writeFile(
		join(root, "package.json"),
		JSON.stringify({ type: "module", dependencies: Object.fromEntries(PACKAGES.map((pack) => [pack, "*"])) }),
	)
	const program = resolve("node_modules/dependency-cruiser/bin/dependency-cruise.mjs")
	const args = [
		program,
		"app",
		"emails",
		"fakes",
		"tests",
		"--config",
		".dependency-cruiser.mjs",
		"--output-type",
		"json",
	]
	const output = await new Promise<string>((done, failed) => {
		execFile(process.execPath, args, { cwd: root, maxBuffer: 50_000_000 }, (error, stdout, stderr) =>
			stdout ? done(stdout) : failed(error ?? new Error(stderr)),
		)
	})
	return JSON.parse(output).summary.violations
}

describe("the rules of .dependency-cruiser.mjs", () => {
	test("each have a breach planted here", async () => {
		const { default: config } = (await import(pathToFileURL(resolve(".dependency-cruiser.mjs")).href)) as {
			default: { forbidden: { name: string }[] }
		}
		const rules = config.forbidden.map(({ name }) => name)
		expect([...new Set(BREACHES.map(({ rule }) => rule))].toSorted()).toEqual(rules.toSorted())
	})

	test("find nothing in a sound tree", async () => {
		expect(await violationsIn("sound", SOUND)).toEqual([])
	}, 60_000)

	test("find every breach", async () => {
		const planted = Object.fromEntries(BREACHES.map(({ file, code }) => [file, code]))
		const violations = await violationsIn("breached", { ...SOUND, ...SUPPORTS, ...planted })
		const found = violations.map(({ rule, from }) => `${rule.name}: ${from}`)
		for (const { rule, file } of BREACHES) expect(found).toContain(`${rule}: ${file}`)
	}, 60_000)
})
