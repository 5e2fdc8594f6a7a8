/** A CSV file that is saved under `filename`. Not kept by anyone on the way: it is a person's own. */
export function csvFile(text: string, filename: string): Response {
	return new Response(text, { headers: headersOf(filename) })
}

/** As `csvFile`, sent while it is read: a file of any length takes the room of one of its pieces. */
export function csvStream(pieces: AsyncGenerator<string>, filename: string): Response {
	const encoder = new TextEncoder()
	const body = new ReadableStream<Uint8Array>({
		async pull(controller) {
			const { value, done } = await pieces.next()
			if (done) controller.close()
			else controller.enqueue(encoder.encode(value))
		},
		async cancel() {
			await pieces.return(undefined)
		},
	})
	return new Response(body, { headers: headersOf(filename) })
}

function headersOf(filename: string): HeadersInit {
	return {
		"Content-Type": "text/csv; charset=utf-8",
		"Content-Disposition": `attachment; filename="${filename}"`,
		"Cache-Control": "private, no-store",
	}
}
