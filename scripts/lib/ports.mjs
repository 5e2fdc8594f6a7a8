import { createServer } from "node:net"
import { refuse } from "./say.mjs"

const HIGHEST = 65535
const given = new Set()

/** Whether nothing listens on `port` of `host`. Refuses when the port may not be used at all. */
function isFree(port, host = "127.0.0.1") {
	return new Promise((resolve, reject) => {
		const server = createServer()
		server.once("error", (error) => {
			if (error.code === "EADDRINUSE") resolve(false)
			else reject(error)
		})
		server.listen({ port, host, exclusive: true }, () => server.close(() => resolve(true)))
	})
}

/** The first free port from `from` upwards that this process has not given out already. */
export async function freePort(from) {
	for (let port = from; port <= HIGHEST; port += 1) {
		if (!given.has(port) && (await isFree(port))) {
			given.add(port)
			return port
		}
	}
	return refuse(`No port from ${from} upwards is free.`)
}

/** Any free port, for what nobody needs to find by number. */
export function anyPort() {
	return new Promise((resolve, reject) => {
		const server = createServer()
		server.once("error", reject)
		server.listen(0, "127.0.0.1", () => {
			const { port } = server.address()
			server.close(() => resolve(port))
		})
	})
}

/** The port that PORT names, which must be free, or the first free one from 3000 upwards when it names none. */
export async function webPort() {
	const wish = process.env.PORT?.trim()
	if (!wish) return freePort(3000)
	const port = Number(wish)
	if (!/^\d+$/.test(wish) || port < 1 || port > HIGHEST)
		refuse(`PORT must be a number from 1 to ${HIGHEST}, not "${wish}".`)
	const free = await isFree(port).catch((error) => {
		if (error.code === "EACCES") refuse(`This user may not listen on port ${port}: choose one from 1024 upwards.`)
		throw error
	})
	if (!free) refuse(`Port ${port} is taken by another program: stop that, or choose another PORT.`)
	given.add(port)
	return port
}
