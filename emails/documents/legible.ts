/**
 * `value` with each text in it, at any depth, in characters that `writable` holds: composed where accents stand apart,
 * without control signs and joiners, and "?" for what is left, such as an emoji. The PDF renderer writes a character that
 * no typeface has as signs of another alphabet over one another, which makes the words beside it unreadable too.
 */
export function legible<Value>(value: Value, writable: ReadonlySet<number>): Value {
	if (typeof value === "string") return legibleText(value, writable) as Value
	if (Array.isArray(value)) return value.map((part) => legible(part, writable)) as Value
	if (typeof value !== "object" || value === null) return value
	return Object.fromEntries(Object.entries(value).map(([key, part]) => [key, legible(part, writable)])) as Value
}

function legibleText(text: string, writable: ReadonlySet<number>): string {
	const plain = text.normalize("NFC").replace(/\s+/g, " ")
	return Array.from(plain, (sign) => {
		if (writable.has(sign.codePointAt(0) ?? 0)) return sign
		return /^[\p{C}\p{Mn}]$/u.test(sign) ? "" : "?"
	}).join("")
}
