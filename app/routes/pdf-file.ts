/** A PDF that opens in the browser and is saved under `filename`. Not kept by anyone on the way: it is a person's own. */
export function pdfFile(pdf: Uint8Array<ArrayBuffer>, filename: string): Response {
	return new Response(pdf, {
		headers: {
			"Content-Type": "application/pdf",
			"Content-Disposition": `inline; filename="${filename}"`,
			"Cache-Control": "private, no-store",
		},
	})
}
