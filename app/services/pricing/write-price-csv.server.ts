import Papa from "papaparse"
import { plainMoney } from "~/domain/money"
import type { PricedList } from "./find-priced-list.server"

const COLUMNS = ["code", "product", "detail", "pieces per case", "tier", "min cases", "case price", "price per lb"]
/** A cell that begins like a formula, also after blanks, is given a quote in front, so that a spreadsheet shows it. */
const FORMULA = /^\s*[=+\-@\t\r\n]/

const figure = (cents: number) => plainMoney(cents).replaceAll(",", "")

/**
 * A price list as a CSV file that a spreadsheet opens, one line for each break. The list of a tier can be changed and
 * uploaded again: a product by weight has a price per lb and no case price.
 */
export function writePriceCsv(list: PricedList): string {
	const lines = list.products.flatMap((product) =>
		product.breaks.map(({ minCases, caseCents }, index) => {
			const poundCents = product.poundCents?.[index]
			const prices = poundCents === undefined ? [figure(caseCents), ""] : ["", figure(poundCents)]
			const { code, name, detail, piecesPerCase } = product
			return [code, name, detail, piecesPerCase, list.forName, minCases, ...prices]
		}),
	)
	return `\uFEFF${Papa.unparse([COLUMNS, ...lines], { newline: "\r\n", escapeFormulae: FORMULA })}\r\n`
}
