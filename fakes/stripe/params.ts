import { z } from "zod"
import { invalidRequest } from "./errors"
import type { FormTree } from "./form"

/** A whole number written in a form, e.g. an amount in cents. */
export const integer = z
	.string()
	.regex(/^-?\d{1,15}$/, "Invalid integer")
	.transform(Number)

/** `true` or `false` written in a form. */
export const flag = z.enum(["true", "false"], "Invalid boolean").transform((text) => text === "true")

/** Text, where the empty string takes the value away. */
export const clearable = z.string().transform((text) => (text === "" ? null : text))

/** Three letters, answered in lower case. */
export const currency = z
	.string()
	.regex(/^[a-zA-Z]{3}$/, "Invalid currency")
	.transform((text) => text.toLowerCase())

/** A list, sent as numbered keys. */
export function list<Item extends z.ZodType>(item: Item) {
	return z.preprocess(
		(value) => (typeof value === "object" && value !== null ? Object.values(value) : value),
		z.array(item),
	)
}

/** Key-value pairs, with Stripe's limits; an empty value takes the key away, an empty string takes all away. */
export const metadata = z.union([
	z.literal("").transform(() => null),
	z
		.record(
			z.string().max(40, "Metadata keys can have up to 40 characters"),
			z.string().max(500, "Metadata values can have up to 500 characters"),
		)
		.refine((pairs) => Object.keys(pairs).length <= 50, "Metadata can have up to 50 keys"),
])

/** `created` filters of lists: a moment in seconds, or bounds. */
const created = z.union([
	integer,
	z.strictObject({ gt: integer.optional(), gte: integer.optional(), lt: integer.optional(), lte: integer.optional() }),
])

/** What every list endpoint takes. */
export const paging = {
	limit: integer.optional(),
	starting_after: z.string().optional(),
	ending_before: z.string().optional(),
	created: created.optional(),
	expand: list(z.string()).optional(),
}
export type Paging = z.infer<z.ZodObject<typeof paging>>

/** What every other endpoint takes. */
export const expandable = { expand: list(z.string()).optional() }

/**
 * A schema for the parameters of one endpoint, named by the SDK's type for them: a name that the SDK no longer knows
 * fails the compiler, a name that the fake does not know is refused when it is sent.
 */
export function paramsOf<Params>() {
	return <Shape extends { [name: string]: z.ZodType }>(
		shape: Shape & { [Name in Exclude<keyof Shape, keyof Params>]: never },
	) => z.strictObject<Shape>(shape)
}

/** Adds `changes` to `before`, dropping the keys whose new value is empty. Null drops all. */
export function mergeMetadata(
	before: Record<string, string>,
	changes: Record<string, string> | null | undefined,
): Record<string, string> {
	if (changes === null) return {}
	return Object.fromEntries(Object.entries({ ...before, ...changes }).filter(([, value]) => value !== ""))
}

function paramName(path: PropertyKey[]): string {
	const [first, ...rest] = path.map(String)
	return `${first ?? ""}${rest.map((key) => `[${key}]`).join("")}`
}

/**
 * Reads `form` by `schema`. Refuses as Stripe does: `parameter_unknown` for a name that the fake does not know (so that
 * nothing that would matter in earnest is passed over in silence), `parameter_missing`, or the value's own message.
 */
export function readParams<Schema extends z.ZodType>(schema: Schema, form: FormTree): z.infer<Schema> {
	const result = schema.safeParse(form)
	if (result.success) return result.data
	const issue = result.error.issues[0]
	if (!issue) throw invalidRequest("Invalid request")
	if (issue.code === "unrecognized_keys") {
		const param = paramName([...issue.path, issue.keys[0] ?? ""])
		throw invalidRequest(`Received unknown parameter: ${param}`, { code: "parameter_unknown", param })
	}
	const param = paramName(issue.path)
	const missing = issue.code === "invalid_type" && valueAt(form, issue.path) === undefined
	if (missing) throw invalidRequest(`Missing required param: ${param}.`, { code: "parameter_missing", param })
	const code = issue.message === "Invalid integer" ? { code: "parameter_invalid_integer" } : {}
	throw invalidRequest(`${issue.message}: ${param}`, { ...code, param })
}

function valueAt(form: FormTree, path: PropertyKey[]): unknown {
	return path.reduce<unknown>(
		(node, key) => (typeof node === "object" && node !== null ? (node as FormTree)[String(key)] : undefined),
		form,
	)
}
