import { randomBytes } from "node:crypto"
import { PassThrough } from "node:stream"
import { buffer } from "node:stream/consumers"
import { renderToPipeableStream } from "react-dom/server"
import { type EntryContext, ServerRouter } from "react-router"
import { contentSecurityPolicy, originOf } from "~/platform/csp.server"
import { NonceContext } from "~/ui/nonce"

/** A page that takes longer than this to render is given up. */
const RENDER_TIMEOUT_MS = 10_000

/**
 * Answers with the whole page in one buffer: pages are small, and that is quicker than streaming them. The status is known
 * before the first byte goes out, and a page without script is complete.
 */
export default async function handleRequest(
	request: Request,
	responseStatusCode: number,
	responseHeaders: Headers,
	routerContext: EntryContext,
): Promise<Response> {
	const nonce = randomBytes(18).toString("base64")
	let status = responseStatusCode
	const html = await new Promise<PassThrough>((resolve, reject) => {
		const { pipe, abort } = renderToPipeableStream(
			<NonceContext value={nonce}>
				<ServerRouter context={routerContext} url={request.url} nonce={nonce} />
			</NonceContext>,
			{
				nonce,
				// Large parts would otherwise be moved into place by a script.
				progressiveChunkSize: Number.POSITIVE_INFINITY,
				onAllReady() {
					clearTimeout(timer)
					resolve(pipe(new PassThrough()))
				},
				onShellError: reject,
				onError(error) {
					status = 500
					console.error(error)
				},
			},
		)
		const timer = setTimeout(abort, RENDER_TIMEOUT_MS)
	})
	responseHeaders.set("Content-Type", "text/html; charset=utf-8")
	responseHeaders.set(
		"Content-Security-Policy",
		contentSecurityPolicy({
			nonce,
			paymentOrigin: originOf(process.env.STRIPE_API_BASE),
			isDevelopment: import.meta.env.DEV,
		}),
	)
	return new Response(await buffer(html), { status, headers: responseHeaders })
}
