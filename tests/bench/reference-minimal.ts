import { createRequestHandler } from "@react-router/express"
import compression from "compression"
import express from "express"
import type { ServerBuild } from "react-router"
import { bodyLimit, clientAddress, securityHeaders } from "~/platform/http.server"
import { requestLog } from "~/platform/log.server"
import { listen } from "~/platform/serve.server"

// Found beside this file at run time, as the product finds its own pages.
const pages = new URL("../minimal/server/index.js", import.meta.url).href
const build: ServerBuild = await import(/* @vite-ignore */ pages)

/** The product's server around the one page: the same middleware in the same order, but for health and copies. */
const app = express()
app.disable("x-powered-by")
app.disable("etag")
app.use(requestLog(), clientAddress)
app.use(securityHeaders(false))
app.use(compression())
app.use("/assets", express.static(".waxbill/bench/build/minimal/client/assets", { immutable: true, index: false }))
app.use(express.static(".waxbill/bench/build/minimal/client", { index: false, redirect: false }))
app.use(bodyLimit)
app.use(createRequestHandler({ build, mode: "production" }))
listen(app, { host: "127.0.0.1", port: Number(process.env.PORT) }, async () => {})
