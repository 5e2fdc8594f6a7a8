import "./lib/node-version.mjs"
import { join } from "node:path"
import { orRefuse } from "./lib/commands.mjs"
import { supervise } from "./lib/crew.mjs"
import { chosenDatabase, readDotenv } from "./lib/database.mjs"
import { ensureInstalled } from "./lib/install.mjs"
import { root, workFolder } from "./lib/paths.mjs"
import { freePort, webPort } from "./lib/ports.mjs"
import { choosePorts, productEnv, startStandIns } from "./lib/product.mjs"
import { untilItAnswers } from "./lib/wait.mjs"
import { welcome } from "./lib/welcome.mjs"

const reactRouter = join(root, "node_modules/@react-router/dev/bin.js")
const tsx = join(root, "node_modules/tsx/dist/cli.mjs")

/** As `npm start`, from the sources: pages are replaced in the browser as you edit, the worker starts anew. */
await supervise(
	workFolder,
	async (crew) => {
		readDotenv()
		const web = await webPort()
		await ensureInstalled()
		const database = await chosenDatabase(crew)
		const ports = await choosePorts(() => freePort(3001), web)
		const env = productEnv({ databaseUrl: database.url, ports, nodeEnv: "development" })
		const fromSource = (file, sentence) => orRefuse(sentence, process.execPath, ["--import", "tsx", file], { env })
		await fromSource("scripts/entries/migrate.ts", "The database could not be brought up to date.")
		await fromSource("scripts/entries/seed.ts", "The demo data could not be written.")
		await startStandIns(crew, { ports, env, folder: workFolder })
		const printed = (name) => ({ env, onLine: (line) => line.trim() && console.log(`${name.padEnd(6)} ${line}`) })
		crew.start("worker", process.execPath, [tsx, "watch", "app/jobs/worker.server.ts"], printed("worker"))
		const args = [reactRouter, "dev", "--host", "127.0.0.1", "--port", String(web), "--strictPort"]
		const pages = crew.start("web server", process.execPath, args, printed("web"))
		await untilItAnswers(`http://127.0.0.1:${web}/`, pages, { seconds: 120 })
		welcome({ ports, dataFolder: database.folder })
		await crew.ended
	},
	{ signalCode: 0 },
)
