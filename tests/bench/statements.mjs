import { readFileSync } from "node:fs"

/**
 * Statements as a database sees them, from two sources that must agree: the files kept beside this one, where each
 * parameter has a name, and the database's own log of what the product really ran.
 * A statement is `{ text, names }` from a file, `{ text, values }` from the log; `text` has its parameters as $1, $2 and so
 * on in the order in which they stand, and single spaces.
 */

const ENTRY =
	/^\d{4}-\d{2}-\d{2} [\d:.]+ \S+ \[(\d+)\] (?:LOG: {2}(?:statement|execute [^:]+)|(DETAIL): {2}parameters): /
const UUID_LITERAL = /'[0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12}'/g
const NAME = /(?<!:):([a-z_]+)/g

/** How a statement is laid out does not matter. */
const inOneLine = (text) => text.replaceAll(/\s+/g, " ").replaceAll("( ", "(").replaceAll(" )", ")").trim()

/** Reads a kept file: comments are left out, a semicolon at the end of a line ends a statement. */
export function readStatements(file) {
	const sql = readFileSync(file, "utf8").replaceAll(/^\s*--.*$/gm, "")
	return sql
		.split(/;[ \t]*$/m)
		.map(inOneLine)
		.filter(Boolean)
		.map((kept) => {
			const names = []
			const text = kept.replaceAll(NAME, (_, name) => `$${names.push(name)}`)
			return { text, names }
		})
}

/** Reads what the server processes other than `ownPid` ran from a stretch of the database's log. */
export function readLog(stretch, ownPid) {
	const ran = []
	for (const entry of stretch.split(/\n(?!\t)/)) {
		const [head, pid, isDetail] = ENTRY.exec(entry) ?? []
		if (!head || Number(pid) === ownPid) continue
		const rest = entry.slice(head.length).replaceAll("\n\t", "\n")
		if (isDetail) ran.at(-1).values = readParameters(rest)
		else ran.push(asRun(rest))
	}
	return ran
}

/** An id that stands in the text itself, where the protocol takes no parameter, is read as one all the same. */
function asRun(sql) {
	const values = []
	const text = /\$\d/.test(sql) ? sql : sql.replaceAll(UUID_LITERAL, (id) => `$${values.push(id.slice(1, -1))}`)
	return { text: inOneLine(text).replace(/;$/, ""), values }
}

function readParameters(list) {
	return [...list.matchAll(/\$\d+ = (?:'((?:[^']|'')*)'|NULL)/g)].map(
		([, quoted]) => quoted?.replaceAll("''", "'") ?? null,
	)
}

/**
 * Holds a kept file against what ran: the same statements in the same order, and parameters of one name with one value.
 * Answers the value of each name. Throws with both texts at the first difference: then the file must follow the product.
 */
export function agree(title, kept, ran) {
	const values = {}
	for (let index = 0; index < Math.max(kept.length, ran.length); index += 1) {
		const [is, was] = [kept[index], ran[index]]
		if (is?.text !== was?.text) {
			throw new Error(
				`${title} does not hold what the product runs: statement ${index + 1} is\n  ${was?.text ?? "none"}\nand not\n  ${is?.text ?? "none"}`,
			)
		}
		for (const [position, name] of is.names.entries()) {
			const value = was.values[position]
			if (name in values && values[name] !== value)
				throw new Error(`${title} gives one name, ${name}, to ${values[name]} and to ${value}`)
			values[name] = value
		}
	}
	return values
}
