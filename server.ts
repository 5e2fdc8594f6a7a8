import { createRequestHandler } from "@react-router/express"
import compression from "compression"
import express, { type Express, type RequestHandler } from "express"
import { createRequestHandler as createPageHandler, type ServerBuild } from "react-router"
import { closePool } from "~/db/client.server"
import { shopStamp } from "~/db/shop-stamp.server"
import { type Env, EnvironmentError, readEnv } from "~/platform/env.server"
import { live, ready } from "~/platform/health.server"
import { bodyLimit, clientAddress, lastResort, privatePages, securityHeaders } from "~/platform/http.server"
import { requestLog } from "~/platform/log.server"
import { renderedCopies } from "~/platform/rendered-copy.server"
import { inProcesses, listen } from "~/platform/serve.server"

/**
 * The address of a shop front, with the market day that was chosen, or of the public page of a lot. Any other query is
 * answered by the page itself.
 */
const SHOP_FRONT = /^\/shop\/([a-z0-9-]+)(?:\?day=[0-9a-f-]{36}|\/lots\/[\w.~%-]{1,120})?$/

/** The web server's middleware; the order matters, and each step says what it relies on. */
function createApp(env: Env, build: ServerBuild): Express {
	const app = express()
	app.disable("x-powered-by")
	app.disable("etag")
	app.set("trust proxy", env.TRUST_PROXY_HOPS)

	// 1. First, so that every answer is logged and every request has its id and its client's address.
	app.use(requestLog(), clientAddress)
	// 2. Before anything that could fail: a probe must tell the process's state, not that of the pages.
	app.get("/health/live", live)
	app.get("/health/ready", ready)
	app.use(securityHeaders(env.BASE_URL.startsWith("https:")))
	// 3. Behind the headers, ahead of compression: copies are compressed once, when they are made.
	app.use(shopCopies(env, build))
	// 4. Names under /assets change with their content; the rest of the folder keeps its names.
	app.use(compression())
	app.use("/assets", express.static("build/client/assets", { immutable: true, maxAge: "1y", index: false }))
	app.use(express.static("build/client", { maxAge: "1h", index: false, redirect: false }))
	// 5. The pages, behind the limit on what may be sent to them.
	app.use(bodyLimit, privatePages)
	app.use(createRequestHandler({ build, mode: env.NODE_ENV }))
	app.use(lastResort)
	return app
}

/** The public shop fronts and lot pages, which change only when stock, prices or lots do. */
function shopCopies(env: Env, build: ServerBuild): RequestHandler {
	return renderedCopies({
		keyOf: (request) => (SHOP_FRONT.test(request.url) ? request.url : null),
		stampOf: (key) => shopStamp(SHOP_FRONT.exec(key)?.[1] ?? ""),
		render: createPageHandler(build, env.NODE_ENV),
		origin: env.BASE_URL,
	})
}

/** The environment, or the end of the process with every fault named. */
function completeEnv(): Env {
	try {
		return readEnv()
	} catch (error) {
		if (!(error instanceof EnvironmentError)) throw error
		console.error(error.message)
		process.exit(1)
	}
}

const env = completeEnv()
// Found beside this file at run time, not bundled into it: the pages are a build of their own.
const pages = new URL("../server/index.js", import.meta.url).href

inProcesses(env.PROCESSES, async () => {
	const build: ServerBuild = await import(/* @vite-ignore */ pages)
	listen(createApp(env, build), { host: env.HOST, port: env.PORT }, closePool)
})
