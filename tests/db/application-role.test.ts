import { expect, test } from "vitest"
import { pool } from "~/db/client.server"
import { connect, INSUFFICIENT_PRIVILEGE, refusalOf } from "./connections"

const owner = await connect()

test("the product's connections run as the application role", async () => {
	const { rows } = await pool().query("select current_user as role, current_setting('is_superuser') as super")
	expect(rows).toEqual([{ role: "waxbill_app", super: "off" }])
})

test("the application role is no superuser, passes no row security, makes no role and belongs to no other", async () => {
	const { rows } = await owner.query(
		`select rolsuper, rolbypassrls, rolcreaterole, rolcreatedb, rolreplication, rolcanlogin,
			(select count(*)::int from pg_auth_members m where m.member = r.oid) as memberships
		from pg_roles r where rolname = 'waxbill_app'`,
	)
	expect(rows).toEqual([
		{
			rolsuper: false,
			rolbypassrls: false,
			rolcreaterole: false,
			rolcreatedb: false,
			rolreplication: false,
			rolcanlogin: false,
			memberships: 0,
		},
	])
})

test("the application role owns nothing", async () => {
	const { rows } = await owner.query(
		"select classid::regclass::text as kind, objid from pg_shdepend where refobjid = 'waxbill_app'::regrole and deptype = 'o'",
	)
	expect(rows).toEqual([])
})

test("only the functions named here run with more rights than their caller has", async () => {
	const { rows } = await owner.query<{ name: string }>(
		`select oid::regproc::text as name from pg_proc
		where prosecdef and pronamespace::regnamespace::text in ('public', 'jobs', 'drizzle') order by 1`,
	)
	expect(rows.map(({ name }) => name)).toEqual([
		"close_forward",
		"harvested_is_somewhere",
		"jobs.enqueue",
		"jobs.enqueue_all",
		"jobs.free_stuck",
		"keep_lot_state",
		"keep_returned",
		"keep_settled",
		"keep_stock_balance",
		"only_released_leaves",
		"raise_shop_version",
		"refuse_closed_day",
		"withdrawn_stays",
	])
})

test("the application changes no table, no policy and no trigger", async () => {
	for (const statement of [
		"alter table stores disable row level security",
		"drop policy own_producer on stores",
		"alter table stock_moves disable trigger all",
		"create table spare (id int)",
		"select protect_producer_table('stores')",
		"truncate stores",
	]) {
		expect([statement, (await refusalOf(pool().query(statement))).code]).toEqual([statement, INSUFFICIENT_PRIVILEGE])
	}
})
