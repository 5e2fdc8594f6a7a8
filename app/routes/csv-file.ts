/** A CSV file that is saved under `filename`. Not kept by anyone on the way: it is a person's own. */
export function csvFile(text: string, filename: string): Response {
	return new Response(text, {
		headers: {
			"Content-Type": "text/csv; charset=utf-8",
			"Content-Disposition": `attachment; filename="${filename}"`,
			"Cache-Control": "private, no-store",
		},
	})
}
