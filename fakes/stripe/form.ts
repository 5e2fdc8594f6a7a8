/** A decoded form: text at the leaves, nested by the brackets in the names. Lists are objects with keys "0", "1", … */
export type FormTree = { [key: string]: string | FormTree }

function segments(name: string): string[] {
	const open = name.indexOf("[")
	if (open < 0) return [name]
	const inner = [...name.slice(open).matchAll(/\[([^\]]*)\]/g)].map((match) => match[1] ?? "")
	return [name.slice(0, open), ...inner]
}

/**
 * Decodes a form-encoded body with Stripe's brackets: `a[b]=1&c[0][d]=2&e[]=3`. An empty pair of brackets takes the next
 * free number. Keys are the sender's words, so the objects have no prototype to reach into.
 */
export function parseForm(body: string): FormTree {
	const root: FormTree = Object.create(null)
	for (const [name, value] of new URLSearchParams(body)) {
		const path = segments(name)
		let node = root
		for (const [depth, raw] of path.entries()) {
			const key = raw === "" ? String(Object.keys(node).length) : raw
			if (depth === path.length - 1) {
				node[key] = value
				break
			}
			const next = node[key]
			if (typeof next === "object") {
				node = next
			} else {
				const made: FormTree = Object.create(null)
				node[key] = made
				node = made
			}
		}
	}
	return root
}
