/** A piece of XML that is written already. */
export type Xml = string & { readonly xml: unique symbol }

type Child = Xml | null | false

/**
 * Writes one element. Text is escaped, and what XML 1.0 cannot hold (control signs, half of a pair) is left out; children
 * that are null or false are left out too. Attributes go in the order given. Source: W3C, XML 1.0 (fifth edition), 2.2, 2.4.
 */
export function element(
	name: string,
	content: string | readonly Child[],
	attributes: Record<string, string> = {},
): Xml {
	const written = Object.entries(attributes).map(([key, value]) => ` ${key}="${escaped(value)}"`)
	const inside = typeof content === "string" ? escaped(content) : content.filter(Boolean).join("")
	return `<${name}${written.join("")}>${inside}</${name}>` as Xml
}

/** A whole XML file in UTF-8 from its one element. */
export function xmlFile(root: Xml): string {
	return `<?xml version="1.0" encoding="UTF-8"?>\n${root}\n`
}

const SIGNS: Record<string, string> = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;" }

function escaped(text: string): string {
	return Array.from(text)
		.filter((sign) => isAllowed(sign.codePointAt(0) ?? 0))
		.map((sign) => SIGNS[sign] ?? sign)
		.join("")
}

function isAllowed(point: number): boolean {
	if (point < 0x20) return point === 0x9 || point === 0xa || point === 0xd
	return point <= 0xd7ff || (point >= 0xe000 && point <= 0xfffd) || point >= 0x10000
}
