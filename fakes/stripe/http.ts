import type { IncomingMessage, ServerResponse } from "node:http"

const LARGEST_BODY = 1_000_000

/** The request's body as text. Throws when it is larger than a megabyte. */
export async function readBody(request: IncomingMessage): Promise<string> {
	const parts: Buffer[] = []
	let size = 0
	for await (const part of request) {
		size += part.length
		if (size > LARGEST_BODY) throw new Error("The body is larger than a megabyte")
		parts.push(part)
	}
	return Buffer.concat(parts).toString("utf8")
}

export function sendJson(
	response: ServerResponse,
	status: number,
	body: string,
	headers: Record<string, string> = {},
): void {
	response.writeHead(status, { "Content-Type": "application/json", ...headers }).end(body)
}

/** Sends a page that may load nothing and run nothing: all it has is its own style. */
export function sendPage(response: ServerResponse, status: number, html: string): void {
	response
		.writeHead(status, {
			"Content-Type": "text/html; charset=utf-8",
			"Cache-Control": "no-store",
			"Content-Security-Policy":
				"default-src 'none'; style-src 'unsafe-inline'; base-uri 'none'; frame-ancestors 'none'",
			"Referrer-Policy": "no-referrer",
		})
		.end(html)
}

/** 303, so that a form's answer can be loaded anew without posting again. */
export function redirect(response: ServerResponse, to: string): void {
	response.writeHead(303, { Location: to }).end()
}
