import Papa from "papaparse"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Period } from "~/domain/books/period"
import type { Day } from "~/domain/calendar"
import { harvestedPieces } from "~/domain/figures/shares"
import { spanFor } from "~/domain/figures/spans"
import { plainMoney } from "~/domain/money"
import { findCropSold } from "./find-crop-sold.server"
import { findChannels, findProducts, findSpans, findStores } from "./find-sales.server"
import { findSleeping } from "./find-sleeping.server"

/** The figures that can be had as a file. */
export const figureFiles = ["spans", "products", "stores", "channels", "crop", "sleeping"] as const
export type FigureFile = (typeof figureFiles)[number]

type FileQuery = Period & { producerId: string; today: Day; quietWeeks: number }
type Rows = (string | number)[][]

/** A cell that begins like a formula, also after blanks, is given a quote in front, so that a spreadsheet shows it. */
const FORMULA = /^\s*[=+\-@\t\r\n]/

/** One figure as a CSV file: its head, and a line for each row; all stores, not only the first. */
export async function writeFiguresCsv(query: FileQuery & { of: FigureFile }): Promise<string> {
	const rows = await readProducer(query.producerId, (tx) => ROWS[query.of](tx, query))
	return `\uFEFF${Papa.unparse(rows, { newline: "\r\n", escapeFormulae: FORMULA })}\r\n`
}

const money = (cents: number) => plainMoney(cents).replaceAll(",", "")

const ROWS: Record<FigureFile, (tx: Tx, query: FileQuery) => Promise<Rows>> = {
	spans: async (tx, query) => {
		const span = spanFor(query)
		return [
			[`First day of the ${span}`, "Stores", "Stall"],
			...(await findSpans(tx, query, span)).map((one) => [one.startOn, money(one.storeCents), money(one.stallCents)]),
		]
	},
	products: async (tx, query) => [
		["Code", "Product", "Detail", "Stores", "Cases", "Stall", "Pieces"],
		...(await findProducts(tx, query)).map((one) => [
			...[one.code, one.name, one.detail, money(one.storeCents), one.storeCases],
			...[money(one.stallCents), one.stallPieces],
		]),
	],
	stores: async (tx, query) => [
		["Store", "Amount", "Invoices", "Last invoice"],
		...(await findStores(tx, query, null)).stores.map((one) => [one.name, money(one.cents), one.invoices, one.lastOn]),
	],
	channels: async (tx, query) => [
		["Where", "Amount", "Invoices or sales"],
		...(await findChannels(tx, query)).map((one) => [one.of ?? "Stores", money(one.cents), one.count]),
	],
	crop: async (tx, query) => [
		["Code", "Product", "Detail", "Harvested", "Sold", "In stock", "Waste", "Missing", "Cut up"],
		...(await findCropSold(tx, query)).map((one) => [
			...[one.code, one.name, one.detail, harvestedPieces(one), one.soldPieces],
			...[one.stockPieces, one.wastePieces, one.missingPieces, one.cutUpPieces],
		]),
	],
	sleeping: async (tx, query) => [
		["Store", "Last delivery", "Bought since last season"],
		...(await findSleeping(tx, query)).map((one) => [one.name, one.lastOn, money(one.cents)]),
	],
}
