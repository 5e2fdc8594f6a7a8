const FORM_NAMES = {
	round: "Round",
	basswood: "Basswood",
	"clear-box": "Clear-box",
	"cut-comb": "Cut comb",
	"half-piece": "Half piece",
	chunk: "Chunk jar",
	frame: "Frame",
} as const

/** A form of comb, as products carry it. */
export type Form = keyof typeof FORM_NAMES

/**
 * The names of products at the stall, one or two words, by id: the form alone, with the flora where two share a form, and
 * with the number where they share that too. No two names are the same, as numbers are not.
 */
export function shortNames(
	products: readonly { id: string; code: string; form: Form; flora: string }[],
): Map<string, string> {
	const byForm = (one: { form: Form }) => FORM_NAMES[one.form]
	const byFlora = (one: { form: Form; flora: string }) => `${FORM_NAMES[one.form]}, ${one.flora}`
	const isAlone = (name: string, naming: (one: (typeof products)[number]) => string) =>
		products.filter((other) => naming(other) === name).length === 1
	return new Map(
		products.map((product) => {
			if (isAlone(byForm(product), byForm)) return [product.id, byForm(product)]
			if (product.flora !== "" && isAlone(byFlora(product), byFlora)) return [product.id, byFlora(product)]
			return [product.id, `${byForm(product)} ${product.code}`]
		}),
	)
}
