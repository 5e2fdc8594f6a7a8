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

type Named = { id: string; code: string; form: Form; flora: string }

/**
 * The names of products at the stall, one or two words, by id: the form alone, with the flora where two share a form, and
 * with the number where they share that too. No two names are the same, as numbers are not.
 */
export function shortNames(products: readonly Named[]): Map<string, string> {
	const byForm = (one: Named) => FORM_NAMES[one.form]
	const byFlora = (one: Named) => `${FORM_NAMES[one.form]}, ${one.flora}`
	const isAlone = (one: Named, naming: (one: Named) => string) =>
		products.every((other) => other === one || naming(other) !== naming(one))
	const nameOf = (one: Named) => {
		if (isAlone(one, byForm)) return byForm(one)
		return one.flora !== "" && isAlone(one, byFlora) ? byFlora(one) : `${byForm(one)} ${one.code}`
	}
	return new Map(products.map((one) => [one.id, nameOf(one)]))
}
