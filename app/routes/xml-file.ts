/** An XML file that is saved under `filename`. Not kept by anyone on the way: it is a person's own. */
export function xmlFileAnswer(xml: string, filename: string): Response {
	return new Response(xml, {
		headers: {
			"Content-Type": "application/xml; charset=utf-8",
			"Content-Disposition": `attachment; filename="${filename}"`,
			"Cache-Control": "private, no-store",
		},
	})
}
