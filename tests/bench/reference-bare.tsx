import { createServer } from "node:http"
import { askedOf, openPool } from "./bare/asked-of"
import { readRows } from "./bare/read-rows"
import { renderSheet } from "./bare/render-sheet"
import { sheetOf } from "./bare/sheet-of"

const PATH = /^\/buy\/([a-z0-9-]+)\/([a-z0-9-]+)\/sheet\/(\d{4}-\d{2}-\d{2})$/

/**
 * The order sheet without a framework: node:http for the request, pg for the same statements on a pool of the same size,
 * react-dom/server for the same page. It has no routes but this one, no headers but the needed, no log.
 */
const pool = openPool()

const server = createServer(async (request, response) => {
	try {
		const path = request.url ?? ""
		const [, producer, store, day] = PATH.exec(path) ?? []
		const asked = askedOf({ producer, store, day }, request.headers.cookie)
		const rows = asked && (await readRows(pool, asked))
		if (!rows || !producer || !store || !day) return void response.writeHead(404).end()
		const html = renderSheet(await sheetOf(rows, asked), { path, params: { producer, store, day } })
		response.writeHead(200, { "Content-Type": "text/html; charset=utf-8" }).end(html)
	} catch (error) {
		console.error(error)
		response.writeHead(500).end()
	}
})

server.listen(Number(process.env.PORT), "127.0.0.1")
process.once("SIGTERM", () => process.exit(0))
