import { describe, expect, test } from "vitest"
import { readOrderList } from "~/services/orders/read-order-list.server"

const file = (...parts: BlobPart[]) => new File(parts, "order.csv", { type: "text/csv" })

describe("an uploaded list", () => {
	test.each([
		["commas", 'code,cases\r\n11,"1,200"\r\n'],
		["semicolons", "code;cases\n11;1,200\n"],
		["tabs", "code\tcases\n11\t1,200"],
	])("is read with %s between its columns", async (_, text) => {
		const list = await readOrderList(file(text))
		expect(list.ok && list.cells.slice(0, 2)).toEqual([
			["code", "cases"],
			["11", "1,200"],
		])
	})

	test("keeps its empty rows, so that rows are counted as the spreadsheet counts them", async () => {
		const list = await readOrderList(file("11;2\n\n99;1\n"))
		expect(list.ok && list.cells).toEqual([["11", "2"], [""], ["99", "1"], [""]])
	})

	test("is read when an older spreadsheet wrote it, with a mark before it or in its own letters", async () => {
		const marked = await readOrderList(file(new Uint8Array([0xef, 0xbb, 0xbf]), "11,2"))
		expect(marked.ok && marked.cells[0]).toEqual(["11", "2"])
		const western = await readOrderList(file(new Uint8Array([0x4e, 0xb0, 0x2c, 0x32])))
		expect(western.ok && western.cells[0]).toEqual(["N°", "2"])
	})

	test("is refused empty and above 200 kB", async () => {
		expect(await readOrderList(file(" \n"))).toEqual({ ok: false, reason: "empty" })
		expect(await readOrderList(file("1,2\n".repeat(60_000)))).toEqual({ ok: false, reason: "too-large" })
	})
})
