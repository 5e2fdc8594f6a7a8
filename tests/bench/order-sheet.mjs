import { statementsOf } from "./database.mjs"
import { load } from "./load.mjs"
import { rowsOf } from "./report.mjs"
import { inTurns } from "./rounds.mjs"
import { minimalPageOf, sizeOf } from "./servers.mjs"
import { agree, readStatements } from "./statements.mjs"

const FILE = new URL("order-sheet.sql", import.meta.url)

/** The statements that the bare reference asks: the kept ones, once the product was seen to run the same. */
export async function orderSheetStatements({ database, sheet }) {
	const kept = readStatements(FILE)
	agree("order-sheet.sql", kept, await statementsOf(database, () => pageOf(sheet.url, sheet.cookie)))
	return kept
}

/**
 * The order sheet of a signed-in buyer beside the bare program, which shows the same page from the same statements, and
 * beside a minimal framework page that is as large, once with the same statements asked and once without any database.
 */
export async function measureOrderSheet({ sheet, references, pace, say }) {
	const headers = { cookie: sheet.cookie }
	const bareUrl = `${references.bare}${new URL(sheet.url).pathname}`
	await mustShowTheSame(sheet.url, bareUrl, sheet.cookie)
	const minimalUrl = await minimalPageOf(references.minimal, await sizeOf(sheet.url, headers))
	const readingUrl = `${references.minimal}${new URL(sheet.url).pathname}${new URL(minimalUrl).search}`
	say(
		`Order sheet: ${await sizeOf(sheet.url, headers)} bytes; bare ${await sizeOf(bareUrl, headers)}, minimal ${await sizeOf(minimalUrl)}`,
	)
	const targets = {
		ours: (seconds) => load(sheet.url, { seconds, headers }),
		bare: (seconds) => load(bareUrl, { seconds, headers }),
		reading: (seconds) => load(readingUrl, { seconds, headers }),
		minimal: (seconds) => load(minimalUrl, { seconds }),
	}
	const { ours, bare, reading, minimal } = await inTurns(targets, pace)
	return [
		...rowsOf("Order sheet, beside a bare node:http + pg program: same statements, same page", "pages/s", ours, bare),
		...rowsOf(
			"Order sheet, beside a minimal framework page of its size that asks the same statements",
			"pages/s",
			ours,
			reading,
			0.8,
		),
		...rowsOf(
			"Order sheet, beside a minimal framework page of its size that reads no database",
			"pages/s",
			ours,
			minimal,
		),
	]
}

/** The reference would be worth nothing if it showed less. The page counts minutes, so a second look is allowed. */
async function mustShowTheSame(ours, reference, cookie) {
	for (let look = 0; look < 2; look += 1) {
		if (bodyOf(await pageOf(ours, cookie)) === bodyOf(await pageOf(reference, cookie))) return
	}
	throw new Error("The bare reference shows another page than the product: tests/bench/bare must follow it.")
}

/** What a page shows: without scripts, and without what is made anew for each answer. */
function bodyOf(html) {
	return html
		.slice(html.indexOf("<body>"))
		.replaceAll(/<script[\s\S]*?<\/script>|<!--.*?-->/g, "")
		.replace(/(name="idempotencyKey" value=)"[^"]*"/, "$1")
}

async function pageOf(url, cookie) {
	const response = await fetch(url, { headers: { cookie } })
	if (response.status !== 200) throw new Error(`${url} answers ${response.status}.`)
	return response.text()
}
