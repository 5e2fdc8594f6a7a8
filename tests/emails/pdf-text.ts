import { inflateSync } from "node:zlib"

/**
 * Reads back what a PDF of the product says, page by page, without another program: follows the page tree, unpacks each
 * page's content, and turns glyph numbers into letters by the ToUnicode table of the font in use. Text is in the order
 * of drawing, a line end after each drawn run. Reads only files as this product's renderer writes them.
 */
export function readPdf(pdf: Buffer): { info: string; pages: string[] } {
	const file = pdf.toString("latin1")
	if (!file.startsWith("%PDF-") || !file.trimEnd().endsWith("%%EOF")) throw new Error("not a whole PDF file")
	const objects = new Map<string, string>()
	for (const match of file.matchAll(/(\d+) 0 obj\n([\s\S]*?)\nendobj/g)) objects.set(match[1] ?? "", match[2] ?? "")
	const kids = /\/Kids \[([^\]]*)\]/.exec([...objects.values()].find((text) => text.includes("/Type /Pages")) ?? "")
	return {
		info: infoOf(objects),
		pages: references(kids?.[1]).map((page) => pageText(objects, objects.get(page) ?? "")),
	}
}

/** The entries about the file, "/Title (Invoice 1203)" and the like, each with its value in place. */
function infoOf(objects: Map<string, string>): string {
	const info = [...objects.values()].find((text) => text.includes("/CreationDate")) ?? ""
	return info.replace(/(\d+) 0 R/g, (_, number: string) => objects.get(number) ?? "")
}

const references = (text = "") => [...text.matchAll(/(\d+) 0 R/g)].map((match) => match[1] ?? "")
const referenceIn = (text: string, key: string) => new RegExp(`/${key} (\\d+) 0 R`).exec(text)?.[1] ?? ""

function streamOf(objects: Map<string, string>, number: string): string {
	const body = /stream\n([\s\S]*)\nendstream/.exec(objects.get(number) ?? "")?.[1] ?? ""
	return inflateSync(Buffer.from(body, "latin1")).toString("latin1")
}

function pageText(objects: Map<string, string>, page: string): string {
	const resources = objects.get(referenceIn(page, "Resources")) ?? ""
	const fonts = new Map<string, Map<number, string>>()
	for (const [, name = "", number = ""] of resources.matchAll(/\/(F\d+) (\d+) 0 R/g)) {
		fonts.set(name, lettersOf(streamOf(objects, referenceIn(objects.get(number) ?? "", "ToUnicode"))))
	}
	let letters = new Map<number, string>()
	let text = ""
	for (const [, font, run] of streamOf(objects, referenceIn(page, "Contents")).matchAll(
		/\/(F\d+) [\d.]+ Tf|\[(.*)\] TJ/g,
	)) {
		if (font !== undefined) letters = fonts.get(font) ?? new Map()
		else text += `${[...(run ?? "").matchAll(/<([0-9a-f]*)>/g)].map(([, hex = ""]) => decode(hex, letters)).join("")}\n`
	}
	return text
}

const decode = (hex: string, letters: Map<number, string>) =>
	(hex.match(/.{4}/g) ?? []).map((glyph) => letters.get(Number.parseInt(glyph, 16)) ?? "\ufffd").join("")

/** The table `beginbfrange <first> <last> [<letters> …]` as glyph number to letters. */
function lettersOf(table: string): Map<number, string> {
	const letters = new Map<number, string>()
	for (const [, first = "", list = ""] of table.matchAll(/<([0-9a-f]{4})> <[0-9a-f]{4}> \[([^\]]*)\]/g)) {
		const entries = [...list.matchAll(/<([0-9a-f ]*)>/g)].map(([, hex = ""]) => hex.replaceAll(" ", ""))
		for (const [index, hex] of entries.entries()) {
			const text = Buffer.from(hex, "hex").swap16().toString("utf16le")
			letters.set(Number.parseInt(first, 16) + index, text)
		}
	}
	return letters
}
