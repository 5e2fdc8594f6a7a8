import { describe, expect, test } from "vitest"
import { connect, producerTables, tablesOf } from "./connections"

/** Tables that belong to no producer, and why that is so. */
const PLATFORM_TABLES: Record<string, string> = {
	producers: "names the producers themselves; anyone may find one by the name in the URL",
	users: "a person may work at several producers and buy for several stores",
	sessions: "a signed-in browser is a person's, not a producer's",
	login_codes: "asked for before anyone knows who it is",
	rate_limits: "counts addresses, known or not",
	kept_posts: "kept while nobody is signed in",
	stripe_events: "stored as they come in, before anyone knows whose they are",
}

/** Indexes that do not begin with the producer, and why. */
const OTHER_INDEXES: Record<string, string> = {
	memberships_by_user: "finds where a person is at home, across producers",
}

const owner = await connect()
const tables = await producerTables(owner)

test("every table belongs to a producer or is named here with a reason", async () => {
	const others = (await tablesOf(owner)).flatMap(({ name, hasProducer }) => (hasProducer ? [] : name))
	expect(others.toSorted()).toEqual(Object.keys(PLATFORM_TABLES).toSorted())
	expect(tables.length).toBeGreaterThan(30)
})

describe.each(tables)("%s", (table) => {
	test("is under row security, which binds its owner too", async () => {
		const { rows } = await owner.query(
			"select relrowsecurity, relforcerowsecurity from pg_class where oid = $1::regclass",
			[table],
		)
		expect(rows).toEqual([{ relrowsecurity: true, relforcerowsecurity: true }])
	})

	test("has the rule of its own producer, and no other that writes", async () => {
		const { rows } = await owner.query(
			`select policyname, cmd, qual, with_check from pg_policies
			where schemaname = 'public' and tablename = $1 and cmd <> 'SELECT' order by 1`,
			[table],
		)
		const own = "(producer_id = current_producer())"
		expect(rows).toEqual([{ policyname: "own_producer", cmd: "ALL", qual: own, with_check: own }])
	})

	test("has the producer first in its primary key and in every index", async () => {
		const { rows } = await owner.query<{ name: string; first: string; isPrimary: boolean }>(
			`select i.indexrelid::regclass::text as name, i.indisprimary as "isPrimary",
				coalesce((select attname from pg_attribute where attrelid = i.indrelid and attnum = i.indkey[0]), '') as first
			from pg_index i where i.indrelid = $1::regclass`,
			[table],
		)
		expect(rows.filter((index) => index.isPrimary)).toHaveLength(1)
		expect(rows.filter((index) => index.first !== "producer_id" && !(index.name in OTHER_INDEXES))).toEqual([])
	})

	test("has the producer first in every foreign key to a producer's table, so that none crosses over", async () => {
		const { rows } = await owner.query<{ name: string; target: string; from: string[]; to: string[] }>(
			`select k.conname as name, k.confrelid::regclass::text as target,
				array(select a.attname::text from unnest(k.conkey) with ordinality u(num, at)
					join pg_attribute a on a.attrelid = k.conrelid and a.attnum = u.num order by u.at) as from,
				array(select a.attname::text from unnest(k.confkey) with ordinality u(num, at)
					join pg_attribute a on a.attrelid = k.confrelid and a.attnum = u.num order by u.at) as to
			from pg_constraint k where k.contype = 'f' and k.conrelid = $1::regclass`,
			[table],
		)
		expect(rows.filter((key) => key.target === "producers").map((key) => key.from)).toEqual([["producer_id"]])
		for (const key of rows.filter(({ target }) => tables.includes(target))) {
			expect([key.name, key.from[0], key.to[0]]).toEqual([key.name, "producer_id", "producer_id"])
		}
	})
})

test("no listed exception has gone stale", async () => {
	const { rows } = await owner.query<{ name: string }>(
		"select indexname as name from pg_indexes where schemaname = 'public'",
	)
	for (const index of Object.keys(OTHER_INDEXES)) expect(rows.map(({ name }) => name)).toContain(index)
})
