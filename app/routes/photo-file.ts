/** A photo that a person of the product sent, as it was drawn anew. That its type is as told, every answer says. */
export function photoFile({ mediaType, content }: { mediaType: string; content: Uint8Array }): Response {
	return new Response(new Uint8Array(content), {
		headers: {
			"Content-Type": mediaType,
			"Content-Disposition": "inline",
			"Content-Security-Policy": "default-src 'none'; frame-ancestors 'none'",
		},
	})
}
