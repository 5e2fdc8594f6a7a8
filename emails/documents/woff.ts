import { inflateSync } from "node:zlib"

const WOFF_HEAD = 44
const WOFF_ENTRY = 20
const SFNT_HEAD = 12
const SFNT_ENTRY = 16

/**
 * Unpacks a WOFF file into the plain font (sfnt) inside it: the same tables, uncompressed, behind the plain directory.
 * The PDF renderer unpacks a compressed table again for every glyph, which takes longer than all the rest of a page.
 * Throws RangeError when `woff` is no WOFF file. Source: W3C, WOFF File Format 1.0, sections 3 to 5.
 */
export function plainFontOf(woff: Buffer): Buffer {
	if (woff.length < WOFF_HEAD || woff.toString("latin1", 0, 4) !== "wOFF") throw new RangeError("not a WOFF file")
	const count = woff.readUInt16BE(12)
	const head = Buffer.alloc(SFNT_HEAD + count * SFNT_ENTRY)
	woff.copy(head, 0, 4, 8)
	const log = Math.floor(Math.log2(count))
	head.writeUInt16BE(count, 4)
	head.writeUInt16BE(16 * 2 ** log, 6)
	head.writeUInt16BE(log, 8)
	head.writeUInt16BE(16 * (count - 2 ** log), 10)

	const parts = [head]
	let offset = head.length
	for (let index = 0; index < count; index += 1) {
		const from = WOFF_HEAD + index * WOFF_ENTRY
		const [start, packed, length] = [4, 8, 12].map((at) => woff.readUInt32BE(from + at)) as [number, number, number]
		const stored = woff.subarray(start, start + packed)
		const table = packed < length ? inflateSync(stored) : stored
		const to = SFNT_HEAD + index * SFNT_ENTRY
		woff.copy(head, to, from, from + 4)
		woff.copy(head, to + 4, from + 16, from + 20)
		head.writeUInt32BE(offset, to + 8)
		head.writeUInt32BE(length, to + 12)
		const padded = Buffer.alloc(Math.ceil(length / 4) * 4)
		table.copy(padded)
		parts.push(padded)
		offset += padded.length
	}
	return Buffer.concat(parts)
}

/**
 * The code points that a plain font maps to a glyph, by its Unicode map of the Basic Multilingual Plane ("cmap" format 4).
 * Throws RangeError when the font has none. Source: OpenType, cmap.
 */
export function codePointsOf(font: Buffer): number[] {
	const map = unicodeMapOf(font)
	const segments = map.readUInt16BE(6) / 2
	const [ends, starts] = [14, 16 + segments * 2]
	const points: number[] = []
	for (let index = 0; index < segments; index += 1) {
		const end = map.readUInt16BE(ends + index * 2)
		// The last segment only closes the table.
		for (let point = map.readUInt16BE(starts + index * 2); point <= end && point < 0xffff; point += 1)
			points.push(point)
	}
	return points
}

function unicodeMapOf(font: Buffer): Buffer {
	const tables = Array.from({ length: font.readUInt16BE(4) }, (_, index) => SFNT_HEAD + index * SFNT_ENTRY)
	const entry = tables.find((at) => font.toString("latin1", at, at + 4) === "cmap")
	if (entry === undefined) throw new RangeError("the font maps no characters")
	const cmap = font.subarray(font.readUInt32BE(entry + 8))
	for (let index = 0; index < cmap.readUInt16BE(2); index += 1) {
		const map = cmap.subarray(cmap.readUInt32BE(4 + index * 8 + 4))
		if (map.readUInt16BE(0) === 4) return map
	}
	throw new RangeError("the font has no Unicode map of the usual form")
}
