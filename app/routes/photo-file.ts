/** A photo that a person of the product sent, as it was drawn anew: its type as told, and nothing in it runs. */
export function photoFile({ mediaType, content }: { mediaType: string; content: Uint8Array }): Response {
	return new Response(new Uint8Array(content), {
		headers: {
			"Content-Type": mediaType,
			"Content-Disposition": "inline",
			"Content-Security-Policy": "default-src 'none'; frame-ancestors 'none'",
			"X-Content-Type-Options": "nosniff",
		},
	})
}
