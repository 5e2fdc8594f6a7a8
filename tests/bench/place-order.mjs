import { randomUUID } from "node:crypto"
import { statementsOf } from "./database.mjs"
import { load } from "./load.mjs"
import { addStock, ordersSince, putBack, rememberOrders } from "./order-data.mjs"
import { runPgbench } from "./pgbench.mjs"
import { rowsOf } from "./report.mjs"
import { inTurns } from "./rounds.mjs"
import { agree, readStatements } from "./statements.mjs"

const FILE = new URL("place-order.sql", import.meta.url)
/** Orders of so many kinds are placed side by side: each of other products, and for the open days in turn. */
const KINDS = 4

/**
 * Placing an order over HTTP (session, origin check, form, rules, one transaction) beside pgbench, which runs the same
 * statements on as many connections and nothing else. Both place the same kinds of orders on the same data, which are put
 * back between rounds, and on a cluster that waits for the disk at every commit.
 */
export async function measurePlacing({ database, web, sheet, pace, folder, producer }) {
	await addStock(database, producer)
	const posts = await postsOf(sheet)
	const mark = await rememberOrders(database, producer)
	const kept = readStatements(FILE)
	const kinds = []
	for (const post of posts) {
		const ran = await statementsOf(database, () => placeOne(web, post))
		kinds.push(agree("place-order.sql", kept, ran))
	}
	const fresh = async (orders, place) => {
		await putBack(database, mark)
		const figures = await place(orders)
		const made = await ordersSince(database, mark)
		if (made !== figures.count) throw new Error(`${figures.count} orders were answered, but ${made} are there.`)
		return figures
	}
	let next = 0
	const nextPost = () => posts[next++ % posts.length]()
	const headers = { cookie: sheet.cookie, origin: web }
	const targets = {
		ours: (orders) =>
			fresh(orders, (amount) => load(web, { amount, headers, method: "POST", status: 302, next: nextPost })),
		pgbench: (orders) => fresh(orders, (amount) => runPgbench({ database, folder, kept, kinds, amount })),
	}
	const { orders, warmUpOrders, rounds } = pace
	const { ours, pgbench } = await inTurns(targets, { rounds, seconds: orders, warmUpSeconds: warmUpOrders })
	await putBack(database, mark)
	return rowsOf(
		"Placing an order over HTTP, beside pgbench running the same statements",
		"orders/s",
		ours,
		pgbench,
		0.6,
	)
}

/** Functions that each make the post of one kind of order: two products, one case of each. */
async function postsOf({ url, cookie }) {
	const html = await (await fetch(url, { headers: { cookie } })).text()
	const products = [...html.matchAll(/name="(cases-[0-9a-f-]{36})"/g)].map(([, name]) => name)
	const days = await openDays(url, cookie, html)
	if (products.length < 2 * KINDS) throw new Error(`The demo store buys fewer than ${2 * KINDS} products.`)
	return Array.from({ length: KINDS }, (_, kind) => () => ({
		path: days[kind % days.length],
		headers: { cookie, origin: new URL(url).origin, "content-type": "application/x-www-form-urlencoded" },
		body: new URLSearchParams({
			idempotencyKey: randomUUID(),
			[products[2 * kind]]: "1",
			[products[2 * kind + 1]]: "1",
			poNumber: "",
			note: "",
		}).toString(),
	}))
}

/** The paths of the days on the ribbon that still take orders. */
async function openDays(url, cookie, html) {
	const paths = new Set(
		[...html.matchAll(/href="(\/buy\/[\w/-]+\/sheet\/\d{4}-\d{2}-\d{2})"/g)].map(([, path]) => path),
	)
	const open = []
	for (const path of paths) {
		const page = await fetch(new URL(path, url), { headers: { cookie } })
		if ((await page.text()).includes('name="idempotencyKey"')) open.push(path)
	}
	return open
}

async function placeOne(web, post) {
	const { path, headers, body } = post()
	const response = await fetch(`${web}${path}`, { method: "POST", headers, body, redirect: "manual" })
	if (response.status !== 302) throw new Error(`Placing an order was answered with ${response.status}.`)
	await response.arrayBuffer()
}
