import { load } from "./load.mjs"
import { rowsOf } from "./report.mjs"
import { inTurns } from "./rounds.mjs"
import { minimalPageOf, sizeOf } from "./servers.mjs"

const CHANGES = 20
const STOCK = `pieces > 0 and place in ('cold-room', 'ready')
	and producer_id = (select id from producers where slug = $1)`

/**
 * The public shop front as it is served, from its rendered copy, beside the same page rendered anew (asked for with a
 * query that no copy is kept of) and beside a minimal framework page of its size.
 */
export async function measureShopFront({ web, producer, references, pace, say }) {
	const url = `${web}/shop/${producer}`
	const anewUrl = `${url}?anew`
	const { etag } = await answerOf(url)
	const minimalUrl = await minimalPageOf(references.minimal, await sizeOf(url))
	say(`Shop front: ${await sizeOf(url)} bytes; anew ${await sizeOf(anewUrl)}, minimal ${await sizeOf(minimalUrl)}`)
	const targets = {
		copy: (seconds) => load(url, { seconds }),
		unchanged: (seconds) => load(url, { seconds, headers: { "if-none-match": etag }, status: 304 }),
		anew: (seconds) => load(anewUrl, { seconds }),
		minimal: (seconds) => load(minimalUrl, { seconds }),
	}
	const { copy, unchanged, anew, minimal } = await inTurns(targets, pace)
	return [
		...rowsOf("Shop front from its rendered copy, beside the same page rendered anew", "pages/s", copy, anew, 10),
		...rowsOf(
			"Shop front that the browser has already (304), beside the page rendered anew",
			"answers/s",
			unchanged,
			anew,
		),
		...rowsOf(
			"Shop front from its rendered copy, beside a minimal framework page of its size",
			"pages/s",
			copy,
			minimal,
			0.8,
		),
		...rowsOf("Shop front rendered anew, beside a minimal framework page of its size", "pages/s", anew, minimal),
	]
}

/**
 * Takes all stock off the shelf and puts it back, over and over while the shop front is under load. Each time the very
 * next answer must show it, also to a browser that asks whether its old page still holds. Throws at the first stale one.
 */
export async function mustNeverBeStale({ database, web, producer, seconds }) {
	const url = `${web}/shop/${producer}`
	const [{ count }] = await Promise.all([load(url, { seconds }), changeAndLook(database, url, producer)])
	return `Shop front: ${2 * CHANGES} changes of stock under ${count} other requests, each shown by the very next answer.`
}

async function changeAndLook(database, url, producer) {
	const full = await answerOf(url)
	for (let change = 0; change < CHANGES; change += 1) {
		const moved = await takeAll(database, producer)
		const empty = await answerOf(url, full.etag)
		await putBack(database, moved)
		const again = await answerOf(url, empty.etag)
		const isFresh = empty.status === 200 && empty.html !== full.html && empty.etag !== full.etag
		if (!isFresh || again.html !== full.html || again.etag !== full.etag)
			throw new Error("The shop front was stale after a change of stock.")
	}
}

async function answerOf(url, knownTag) {
	const response = await fetch(url, { headers: knownTag ? { "if-none-match": knownTag } : {} })
	return { status: response.status, etag: response.headers.get("etag"), html: await response.text() }
}

async function takeAll({ client }, producer) {
	const { rows } = await client.query(
		`insert into stock_moves (producer_id, lot_id, from_place, from_ref, to_place, pieces, reason)
		select producer_id, lot_id, place, place_ref, 'waste', pieces, 'bench' from stock_balances where ${STOCK}
		returning id`,
		[producer],
	)
	if (rows.length === 0) throw new Error("The demo has no stock to take off the shelf.")
	return rows.map((row) => row.id)
}

async function putBack({ client }, moveIds) {
	await client.query(
		`insert into stock_moves (producer_id, lot_id, from_place, from_ref, to_place, to_ref, pieces, reason)
		select producer_id, lot_id, to_place, to_ref, from_place, from_ref, pieces, 'bench' from stock_moves
		where id = any($1)`,
		[moveIds],
	)
}
