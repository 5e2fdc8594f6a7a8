import { z } from "zod"
import { readSeenPrice, type SeenPrice } from "~/domain/orders/seen-price"
import { parseCases } from "~/domain/quantity"

/** One product of a posted sheet, as the order takes it. */
type PostedLine = {
	productId: string
	cases: number
	/** What to do when more is asked than is free; false where the buyer has not chosen. */
	keep: false | "free" | "rest"
	leastCases: number
	seen?: SeenPrice
}

/** What a posted order sheet asks for. `values` is everything typed, by field name, to be shown again. */
export type PostedSheet = {
	idempotencyKey: string
	lines: PostedLine[]
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

/** The text fields of a form by name; of a name that stands twice, the last. */
export function textFields(form: FormData): Record<string, string> {
	return Object.fromEntries([...form].flatMap(([name, value]) => (typeof value === "string" ? [[name, value]] : [])))
}

/**
 * Reads a posted order sheet: for each product a field of cases, the least that is of use, the price that was seen and what
 * to do when less is free; an order number and a note. What cannot be read stands in `errors` by the name of its field.
 * Null when the form was not made by us.
 */
export function readSheet(form: FormData): PostedSheet | null {
	const values = textFields(form)
	const errors: Record<string, string> = {}
	const lines = Object.keys(values).flatMap((name) => {
		const productId = CASES_FIELD.exec(name)?.[1]
		return productId ? readLine(productId, values, errors) : []
	})
	const parsed = words.safeParse({ poNumber: "", note: "", ...values })
	if (parsed.success) return { ...parsed.data, lines, values, errors }
	const issues = parsed.error.issues.map((issue) => [String(issue.path[0]), issue.message] as const)
	if (issues.some(([name]) => name === "idempotencyKey")) return null
	for (const [name, message] of issues) errors[name] = message
	return { idempotencyKey: values.idempotencyKey ?? "", poNumber: "", note: "", lines, values, errors }
}

function readLine(productId: string, values: Record<string, string>, errors: Record<string, string>): PostedLine[] {
	const [casesName, leastName] = [`cases-${productId}`, `least-${productId}`]
	const read = parseCases(values[casesName] ?? "")
	if (!read.ok) errors[casesName] = read.message
	if (!read.ok || read.cases === 0) return []
	const least = parseCases(values[leastName] ?? "")
	if (!least.ok) errors[leastName] = least.message
	else if (least.cases > read.cases) errors[leastName] = "The least cannot be more than what you ask for."
	const seen = readSeenPrice(values[`seen-${productId}`] ?? "")
	const keep = values[`keep-${productId}`]
	return [
		{
			productId,
			cases: read.cases,
			keep: keep === "free" || keep === "rest" ? keep : false,
			leastCases: least.ok ? least.cases : 0,
			...(seen ? { seen } : {}),
		},
	]
}
