import type { ErrorRequestHandler, RequestHandler } from "express"
import helmet from "helmet"
import { log } from "./log.server"

/** The largest body taken: forms and events are far smaller. */
const BODY_LIMIT_BYTES = 1024 * 1024

/** Pages that take a file, with the most that may be sent to them: the file and the form around it. */
const LARGER_BODIES: readonly [page: RegExp, bytes: number][] = [
	// A check of a super with its photo of up to 10 MB.
	[/^\/desk\/[^/]+\/crop\/(checks|yards\/[^/]+|supers\/[^/]+)$/, 11 * 1024 * 1024],
	// A report of broken comb with up to three photos of 10 MB to a line.
	[/^\/buy\/[^/]+\/[^/]+\/invoices\/[^/]+\/breakage$/, 61 * 1024 * 1024],
	// A logger's file of up to 200 MB, which is read as it comes in.
	[/^\/desk\/[^/]+\/cold-room\/\d+\/readings(\.json)?$/, 201 * 1024 * 1024],
]
const DRAIN_MS = 5_000

/**
 * Security headers for every answer. Content-Security-Policy is not among them: the page's renderer sets it, as only it
 * knows the nonce. `https` says whether the public address is; only then is it promised for the future (HSTS).
 */
export function securityHeaders(https: boolean): RequestHandler[] {
	return [
		helmet({
			contentSecurityPolicy: false,
			strictTransportSecurity: https ? undefined : false,
			// Stricter than this ("no-referrer") browsers send "Origin: null" with forms, and the origin check refuses them.
			referrerPolicy: { policy: "same-origin" },
			xFrameOptions: { action: "deny" },
		}),
		(_request, response, next) => {
			response.set("Permissions-Policy", "camera=(), microphone=(), geolocation=(), payment=()")
			next()
		},
	]
}

/**
 * Puts the client's network address, as the trusted proxies tell it, into the header X-Client-Address for the routes,
 * over whatever the client wrote there. X-Forwarded-Host is dropped: the proxy passes Host on, and that alone counts.
 */
export const clientAddress: RequestHandler = (request, _response, next) => {
	request.headers["x-client-address"] = request.ip ?? "unknown"
	delete request.headers["x-forwarded-host"]
	next()
}

/** Refuses bodies over the limit (413), and those whose length is not told before they are sent (411). */
export const bodyLimit: RequestHandler = (request, response, next) => {
	const length = request.headers["content-length"]
	const isTooLarge = Number(length ?? 0) > mostBytes(request.path)
	const isUnmeasured = request.headers["transfer-encoding"] !== undefined
	if (!isTooLarge && !isUnmeasured) return next()
	// The rest is read and thrown away for a moment: a browser that is cut off while sending shows no answer at all.
	request.resume()
	setTimeout(() => request.socket.destroy(), DRAIN_MS).unref()
	response.set("Connection", "close").set("Cache-Control", "no-store")
	if (isTooLarge)
		plainPage(response.status(413), "Too large", "What was sent is too large. Go back and send less at once.")
	else plainPage(response.status(411), "Length required", "The length of what is sent must be told first.")
}

/** A navigation of a page that runs asks for the same address with ".data" after it. */
function mostBytes(path: string): number {
	const page = path.replace(/\.data$/, "")
	return LARGER_BODIES.find(([one]) => one.test(page))?.[1] ?? BODY_LIMIT_BYTES
}

/** Pages are made for the person who asks: no cache between may keep one. What a page says itself is added to this. */
export const privatePages: RequestHandler = (_request, response, next) => {
	response.set("Cache-Control", "private, no-cache")
	next()
}

/** The last resort when even the error page could not be made; tells nothing of the cause, which is in the log. */
export const lastResort: ErrorRequestHandler = (error, request, response, next) => {
	log.error({ err: error, requestId: request.headers["x-request-id"] }, "a request failed outside the routes")
	if (response.headersSent) return next(error)
	response.set("Cache-Control", "no-store")
	const isBadAddress = error instanceof URIError || (error instanceof TypeError && "code" in error)
	if (isBadAddress) plainPage(response.status(400), "Bad request", "This address cannot be read.")
	else plainPage(response.status(500), "Something went wrong", "The page could not be made. Try again in a moment.")
}

function plainPage(response: Parameters<RequestHandler>[1], title: string, sentence: string): void {
	response
		.type("html")
		.set("Content-Security-Policy", "default-src 'none'; frame-ancestors 'none'")
		.send(
			`<!doctype html><html lang="en"><meta charset="utf-8"><meta name="viewport" content="width=device-width">` +
				`<title>${title}</title><h1>${title}</h1><p>${sentence}</p></html>\n`,
		)
}
