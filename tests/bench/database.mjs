import { createHash, randomBytes } from "node:crypto"
import { readFileSync } from "node:fs"
import { join } from "node:path"
import pg from "pg"
import { readLog } from "./statements.mjs"

const TRIES = 20

/**
 * The bench's own hand on its cluster, as the superuser: it reads the server's log, signs a buyer in, and puts the data
 * back between rounds. `cluster` is what startCluster answers.
 */
export async function openDatabase(cluster) {
	const url = new URL(cluster.url())
	url.username = "postgres"
	const client = new pg.Client({ connectionString: url.href })
	await client.connect()
	const ownPid = Number((await client.query("select pg_backend_pid() as pid")).rows[0].pid)
	return { client, ownPid, url, log: join(cluster.folder, "log") }
}

/**
 * The statements that the product runs for one `request`, from the server's log. The request is repeated until two in a
 * row show the same: the server takes up the wish to log a moment after it is told, and the first time opens connections.
 */
export async function statementsOf(database, request) {
	const { client, ownPid, log } = database
	const logged = () => readFileSync(log, "utf8")
	await setLogging(client, "all")
	try {
		let before = ""
		for (let tries = 0; tries < TRIES; tries += 1) {
			const from = logged().length
			await request()
			// The statement is written down before its answer goes out, so by now all of the request are.
			const ran = readLog(logged().slice(from), ownPid)
			const texts = JSON.stringify(ran.map(({ text }) => text))
			if (ran.length > 0 && texts === before) return ran
			before = texts
		}
		throw new Error("The same request never showed the same statements twice.")
	} finally {
		await setLogging(client, "none")
	}
}

async function setLogging(client, which) {
	await client.query(`alter system set log_statement = '${which}'`)
	await client.query("select pg_reload_conf()")
}

/** Acts for a producer from here on: the balances that follow a move of stock are under row security for anyone. */
export async function actFor({ client }, producer) {
	await client.query("select set_config('waxbill.producer_id', id::text, false) from producers where slug = $1", [
		producer,
	])
}

/** Writes a session for the person with this address and answers the cookie that opens it. */
export async function signIn(database, email) {
	const token = randomBytes(32).toString("base64url")
	const { rowCount } = await database.client.query(
		`insert into sessions (user_id, token_hash, expires_at)
		select id, $1, now() + interval '1 day' from users where email = $2`,
		[createHash("sha256").update(token).digest("hex"), email],
	)
	if (rowCount !== 1) throw new Error(`The demo has nobody with the address ${email}.`)
	return `waxbill-session=${token}`
}
