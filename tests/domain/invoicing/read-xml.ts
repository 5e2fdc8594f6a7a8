/** An element as read: its name without the prefix, its attributes, and either its text or its children. */
export type Element = { name: string; attributes: Record<string, string>; text: string; children: Element[] }

const SIGNS: Record<string, string> = { "&amp;": "&", "&lt;": "<", "&gt;": ">", "&quot;": '"' }
const plain = (text: string) => text.replace(/&(?:amp|lt|gt|quot);/g, (sign) => SIGNS[sign] ?? sign)

/** Reads XML of elements, attributes and text alone. Throws where it is not well formed or holds a sign that XML forbids. */
export function readXml(xml: string): Element {
	// biome-ignore lint/suspicious/noControlCharactersInRegex: these are what XML 1.0 forbids
	if (/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]|\p{Surrogate}/u.test(xml))
		throw new Error("a sign that XML forbids")
	const root: Element = { name: "", attributes: {}, text: "", children: [] }
	const open = [root]
	const body = xml.replace(/^<\?xml [^?]*\?>\s*/, "")
	let read = 0
	for (const match of body.matchAll(/<(\/?)([\w:]+)((?: [\w:]+="[^"<]*")*)>|([^<]+)/g)) {
		if (match.index !== read) throw new Error(`not XML at ${read}: ${body.slice(read, read + 40)}`)
		read += match[0].length
		const [, slash, name = "", attributes = "", text] = match
		const current = open.at(-1) as Element
		if (text !== undefined) {
			if (/&(?!(?:amp|lt|gt|quot);)/.test(text)) throw new Error(`an open ampersand: ${text}`)
			current.text += plain(text)
		} else if (slash) {
			if (current.name !== name.replace(/^.*:/, "")) throw new Error(`${name} closes ${current.name}`)
			open.pop()
		} else {
			const pairs = [...attributes.matchAll(/ ([\w:]+)="([^"]*)"/g)].map(([, key = "", value = ""]) => [
				key,
				plain(value),
			])
			const element = { name: name.replace(/^.*:/, ""), attributes: Object.fromEntries(pairs), text: "", children: [] }
			current.children.push(element)
			open.push(element)
		}
	}
	const [top] = root.children
	if (read !== body.length || open.length !== 1 || root.children.length !== 1 || !top)
		throw new Error("not one element")
	return top
}
