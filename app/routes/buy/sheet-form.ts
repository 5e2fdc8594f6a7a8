import { z } from "zod"
import { parseCases } from "~/domain/quantity"

/** What a posted order sheet asks for. `values` is everything typed, by field name, to be shown again. */
export type PostedSheet = {
	idempotencyKey: string
	lines: { productId: string; cases: number; keep: boolean }[]
	poNumber: string
	note: string
	values: Record<string, string>
	errors: Record<string, string>
}

const words = z.object({
	idempotencyKey: z.uuid(),
	poNumber: z.string().trim().max(40, "An order number has at most 40 signs."),
	note: z.string().trim().max(500, "A note has at most 500 signs."),
})

const CASES_FIELD = /^cases-([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})$/

/**
 * Reads a posted order sheet: one field of cases for each product, a box to keep what is more than free, an order number
 * and a note. What cannot be read stands in `errors` by the name of its field. Null when the form was not made by us.
 */
export function readSheet(form: FormData): PostedSheet | null {
	const values = Object.fromEntries(
		[...form].flatMap(([name, value]) => (typeof value === "string" ? [[name, value]] : [])),
	)
	const errors: Record<string, string> = {}
	const lines = Object.entries(values).flatMap(([name, typed]) => {
		const productId = CASES_FIELD.exec(name)?.[1]
		if (!productId) return []
		const read = parseCases(typed)
		if (!read.ok) errors[name] = read.message
		if (!read.ok || read.cases === 0) return []
		return { productId, cases: read.cases, keep: values[`keep-${productId}`] !== undefined }
	})
	const parsed = words.safeParse({ poNumber: "", note: "", ...values })
	if (parsed.success) return { ...parsed.data, lines, values, errors }
	const issues = parsed.error.issues.map((issue) => [String(issue.path[0]), issue.message] as const)
	if (issues.some(([name]) => name === "idempotencyKey")) return null
	for (const [name, message] of issues) errors[name] = message
	return { idempotencyKey: values.idempotencyKey ?? "", poNumber: "", note: "", lines, values, errors }
}
