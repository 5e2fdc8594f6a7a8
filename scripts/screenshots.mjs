import "./lib/node-version.mjs"
import { createHash, randomBytes } from "node:crypto"
import { mkdirSync } from "node:fs"
import { join } from "node:path"
import { ensureBuilt } from "./lib/build.mjs"
import { supervise } from "./lib/crew.mjs"
import { ensureChromium } from "./lib/debian.mjs"
import { ensureInstalled } from "./lib/install.mjs"
import { root } from "./lib/paths.mjs"
import { anyPort } from "./lib/ports.mjs"
import { choosePorts, productEnv, runBuilt, startBuilt, startStandIns } from "./lib/product.mjs"
import { say } from "./lib/say.mjs"
import { clearDeadRuns, removeTestFolder, startTestCluster, testFolder } from "./lib/test-work.mjs"

const DESK = { width: 1440, height: 900 }
const PHONE = { width: 390, height: 844 }

/** The pictures of the README: a name, who looks, at what, on which screen. */
const pictures = [
	["order-sheet", "tobias@pantryandplume.example.test", "/buy/larkmoor/pantry-and-plume/sheet", DESK],
	["standing-order", "tobias@pantryandplume.example.test", "/buy/larkmoor/pantry-and-plume/standing", DESK],
	["to-do", "ida@larkmoor.example.test", "/desk/larkmoor", DESK],
	["packing", "wilf@larkmoor.example.test", "/desk/larkmoor/packing", DESK],
	["shop", null, "/shop/larkmoor", DESK],
	["stall", "june@larkmoor.example.test", "/stall/larkmoor", PHONE],
]

/** Signs a demo person in by a session of their own and answers its token. */
async function signIn(client, email) {
	const token = randomBytes(32).toString("base64url")
	const hash = createHash("sha256").update(token).digest("hex")
	await client.query(
		"insert into sessions (user_id, token_hash, expires_at) select id, $2, now() + interval '1 hour' from users where email = $1",
		[email, hash],
	)
	return token
}

async function take({ browser, client, web, folder }, [name, email, path, viewport]) {
	const context = await browser.newContext({ viewport })
	if (email) await context.addCookies([{ name: "waxbill-session", value: await signIn(client, email), url: web }])
	const page = await context.newPage()
	await page.goto(`${web}${path}`)
	// The stall opens on the list of days; the picture is of the first one that sells.
	if (name === "stall") {
		await page.locator("a[aria-current=date]").first().click()
		await page.waitForURL(`${web}${path}/*`)
	}
	await page.evaluate(() => document.fonts.ready)
	await page.waitForLoadState("networkidle")
	await page.screenshot({ path: join(folder, `${name}.png`) })
	await context.close()
	say(`  ${name}.png`)
}

/** Takes the pictures of the README from the demo, in scripts/screenshots. */
await supervise(testFolder, async (crew) => {
	await clearDeadRuns()
	await ensureInstalled()
	await ensureChromium()
	crew.onStop(removeTestFolder)
	const databaseUrl = await startTestCluster(crew)
	await ensureBuilt()
	const ports = await choosePorts(anyPort)
	const env = productEnv({ databaseUrl, ports })
	await runBuilt("migrate", "The database could not be brought up to date.", env)
	await runBuilt("seed", "The demo data could not be written.", env)
	await startStandIns(crew, { ports, env })
	await startBuilt(crew, { env })
	const { chromium } = await import("@playwright/test")
	const { default: pg } = await import("pg")
	const folder = join(root, "scripts/screenshots")
	mkdirSync(folder, { recursive: true })
	const client = new pg.Client({ connectionString: databaseUrl })
	await client.connect()
	const browser = await chromium.launch({ executablePath: "/usr/bin/chromium", args: ["--disable-gpu"] })
	try {
		for (const picture of pictures) await take({ browser, client, web: env.BASE_URL, folder }, picture)
	} finally {
		await browser.close()
		await client.end()
	}
	return 0
})
