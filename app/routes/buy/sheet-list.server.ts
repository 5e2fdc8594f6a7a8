import { added, readColumns, type UnmatchedRow } from "~/domain/orders/read-columns"
import { readOrderList } from "~/services/orders/read-order-list.server"

type Product = { productId: string; code: string }

/** A sheet with a list put into it, or what is wrong with the list. */
type FilledSheet = { values: Record<string, string>; unmatched: UnmatchedRow[]; errors: Record<string, string> }

/** Rows of a list that the sheet can still show; a longer list of strangers is the wrong list. */
const MOST_UNMATCHED = 100

const LIST_WORDS = {
	empty: "There is nothing in this list. Choose a CSV file with product codes and cases.",
	"too-large": "A list has at most 200 kB. Choose a CSV file with product codes and cases.",
}

/** Puts the uploaded list of a posted form into what is typed: a product that the list names gets the list's cases. */
export async function fillFromList(
	form: FormData,
	values: Record<string, string>,
	products: readonly Product[],
): Promise<FilledSheet> {
	const file = form.get("list")
	if (!(file instanceof File) || file.name === "") {
		return {
			values,
			unmatched: [],
			errors: { list: "Choose the list first: a CSV file with product codes and cases." },
		}
	}
	const list = await readOrderList(file)
	if (!list.ok) return { values, unmatched: [], errors: { list: LIST_WORDS[list.reason] } }
	const read = readColumns(list.cells, products)
	const unmatched = read.unmatched.slice(0, MOST_UNMATCHED)
	const found = Object.entries(read.cases)
	if (found.length === 0 && unmatched.length === 0) {
		return {
			values,
			unmatched,
			errors: { list: "This list names no cases. Its first column is the product code, its second the cases." },
		}
	}
	const filled = Object.fromEntries(found.map(([productId, cases]) => [`cases-${productId}`, cases]))
	return { values: { ...values, ...filled }, unmatched, errors: {} }
}

/** What was chosen for the rows of a list that named no product. */
type MendedRows = { values: Record<string, string>; unmatched: UnmatchedRow[]; putIn: number }

/** Puts the rows for which a product was chosen into what is typed, and keeps those for which nothing was chosen yet. */
export function mendRows(values: Record<string, string>, products: readonly Product[]): MendedRows {
	const mended: MendedRows = { values: { ...values }, unmatched: [], putIn: 0 }
	for (let index = 0; index < MOST_UNMATCHED; index += 1) {
		const chosen = values[`mend-${index}`]
		if (chosen === undefined) continue
		const row = rowOf(values, index)
		const product = products.find((one) => one.productId === chosen)
		if (product) {
			const field = `cases-${product.productId}`
			mended.values[field] = added(mended.values[field]?.trim() || undefined, row.cases)
			mended.putIn += 1
		} else if (chosen !== "drop") mended.unmatched.push(row)
	}
	return mended
}

function rowOf(values: Record<string, string>, index: number): UnmatchedRow {
	const number = Number(values[`mend-row-${index}`])
	return {
		row: Number.isSafeInteger(number) && number > 0 ? number : index + 1,
		code: values[`mend-code-${index}`] ?? "",
		cases: values[`mend-cases-${index}`] ?? "",
	}
}
