import { randomUUID } from "node:crypto"
import type { RequestHandler } from "express"
import pino from "pino"

/**
 * Path segments after these are secrets (a link that signs in, accepts an invitation or opens a guest's order).
 * Each is matched as a whole segment, so that pages which merely begin with the word stay readable in the log.
 */
const SECRET_AFTER = ["link", "invitation", "invitations", "order-page"]
/** Anything this long and without a break is taken for a token, wherever it stands. */
const TOKEN_LIKE = /^[A-Za-z0-9_-]{32,}$/
const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i

/**
 * The path of a request as it may be logged: without query string, and with secrets in the path replaced by "…".
 * A file under /assets keeps its name; so does an id in the form of a UUID, unless it follows a secret's word.
 */
export function loggablePath(url: string): string {
	const path = url.split(/[?#]/, 1)[0] ?? ""
	if (path.startsWith("/assets/")) return path
	const segments = path.split("/")
	return segments
		.map((segment, index) => {
			const before = segments[index - 1]
			if (segment !== "" && before !== undefined && SECRET_AFTER.includes(before)) return "…"
			return TOKEN_LIKE.test(segment) && !UUID.test(segment) ? "…" : segment
		})
		.join("/")
}

/**
 * The process's log: JSON lines on standard output at LOG_LEVEL. Log ids, never personal data; the redaction below is the
 * net under that rule, not a replacement for it.
 */
export const log = pino({
	level: process.env.LOG_LEVEL || "info",
	base: { pid: process.pid },
	redact: {
		paths: ["code", "token", "secret", "password", "cookie", "authorization", "email", "*.code", "*.token", "*.email"],
		censor: "[hidden]",
	},
})

/**
 * Express middleware that gives each request an id (header X-Request-Id, towards the application and the client) and
 * writes one line when it ends: method, path, status, milliseconds, id. Never query, cookies, headers or bodies.
 * An id sent by the client is not taken over, since it could be anything.
 */
export function requestLog(logger: Pick<typeof log, "info" | "warn"> = log): RequestHandler {
	return (request, response, next) => {
		const started = process.hrtime.bigint()
		const requestId = randomUUID()
		request.headers["x-request-id"] = requestId
		response.set("X-Request-Id", requestId)
		response.on("close", () => {
			const line = {
				requestId,
				method: request.method,
				path: loggablePath(request.originalUrl),
				status: response.statusCode,
				ms: Math.round(Number(process.hrtime.bigint() - started) / 1e5) / 10,
			}
			if (response.writableFinished) logger.info(line, "request")
			else logger.warn(line, "request was cut off")
		})
		next()
	}
}
