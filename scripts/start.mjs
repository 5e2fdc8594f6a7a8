import "./lib/node-version.mjs"
import { ensureBuilt } from "./lib/build.mjs"
import { supervise } from "./lib/crew.mjs"
import { chosenDatabase, readDotenv } from "./lib/database.mjs"
import { ensureInstalled } from "./lib/install.mjs"
import { workFolder } from "./lib/paths.mjs"
import { freePort, webPort } from "./lib/ports.mjs"
import { choosePorts, productEnv, runBuilt, startBuilt, startStandIns } from "./lib/product.mjs"
import { welcome } from "./lib/welcome.mjs"

/** From a fresh clone to the running product on stand-ins, with demo data; see README.md. */
await supervise(
	workFolder,
	async (crew) => {
		readDotenv()
		const web = await webPort()
		await ensureInstalled()
		const database = await chosenDatabase(crew)
		await ensureBuilt()
		const ports = await choosePorts(() => freePort(3001), web)
		const env = productEnv({ databaseUrl: database.url, ports })
		await runBuilt("migrate", "The database could not be brought up to date.", env)
		await runBuilt("seed", "The demo data could not be written.", env)
		await startStandIns(crew, { ports, env, folder: workFolder })
		await startBuilt(crew, { env })
		welcome({ ports, dataFolder: database.folder })
		await crew.ended
	},
	{ signalCode: 0 },
)
