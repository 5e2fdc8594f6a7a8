import { expect, test } from "@playwright/test"
import pg from "pg"
import { ACTORS, type Actor, type Cast, hireCast, verdict } from "../routes/actors"
import { type Admission, admissions } from "../routes/admissions"
import { addressOf, type BuiltRoute, builtRoutes } from "../routes/built-routes"
import { fingerprint, openYard, type Yard } from "../routes/yard"
import { e2eAddresses } from "../setup/e2e-addresses"

let owner: pg.Client
let yard: Yard
let cast: Cast
let routes: ReadonlyMap<string, BuiltRoute>

test.beforeAll(async () => {
	owner = new pg.Client({ connectionString: e2eAddresses().databaseUrl })
	await owner.connect()
	yard = await openYard(owner)
	cast = await hireCast(owner, yard)
	routes = new Map((await builtRoutes()).map((route) => [route.id, route]))
})

test.afterAll(async () => {
	await cast.leave()
	await yard.clear()
	await owner.end()
})

type Answered = { actor: Actor; status: number; location: string }

/** Asks for the route's page, or posts `fields` to it, as each of the actors; redirects are not followed. */
async function ask(
	actors: readonly Actor[],
	route: BuiltRoute,
	{ fields, params = yard.params }: { fields?: Record<string, string>; params?: Record<string, string> },
): Promise<Answered[]> {
	const { web } = e2eAddresses()
	const cookies = new Map<Actor, string>()
	for (const actor of actors) cookies.set(actor, await cast.cookieOf(actor.name))
	return Promise.all(
		actors.map(async (actor) => {
			const cookie = cookies.get(actor)
			const response = await fetch(`${web}${addressOf(route, params)}`, {
				redirect: "manual",
				headers: { origin: web, ...(cookie && { cookie }) },
				...(fields && { method: "POST", body: new URLSearchParams({ ...fields, walked: "yes" }) }),
			})
			await response.arrayBuffer()
			return { actor, status: response.status, location: response.headers.get("location") ?? "" }
		}),
	)
}

const isSentToSignIn = ({ status, location }: Answered) =>
	status >= 300 && status < 400 && new URL(location, e2eAddresses().web).pathname === "/sign-in"

/** What came, in the words that the table speaks. A page for anyone may itself send on to the sign-in page. */
function outcome(answer: Answered, policy: string, admitted: readonly number[]): string {
	if (policy !== "anyone" && isSentToSignIn(answer)) return "sign-in"
	return admitted.includes(answer.status) ? "admitted" : String(answer.status)
}

/** Pages and redirects; for a post also what a form or a refused post answers. */
const GET_ADMITTED = [200, 302, 303]
const POST_ADMITTED = [200, 302, 303, 400, 409, 422]

async function walk(route: BuiltRoute, admission: Admission, method: "GET" | "POST"): Promise<void> {
	const policy = method === "GET" ? admission.loader : admission.action
	if (policy === undefined) return
	const rules = (method === "GET" ? admission.get : admission.post) ?? {}
	const admitted = rules.admitted ?? (method === "GET" ? GET_ADMITTED : POST_ADMITTED)
	const fields = method === "POST" ? { ...admission.post?.fields } : undefined
	const expected: Record<string, string> = {}
	const found: Record<string, string> = {}
	for (const answer of await ask(ACTORS, route, fields ? { fields } : {})) {
		const { name } = answer.actor
		expected[name] = String(verdict(policy, answer.actor))
		found[name] = outcome(answer, policy, admitted)
	}
	expect(found, `${method} ${route.path}`).toEqual(expected)
}

test("the table names every route of the product, and no other", () => {
	expect([...routes.keys()].toSorted()).toEqual(Object.keys(admissions).toSorted())
})

test("every loader and action says whom it admits", () => {
	for (const { id, loader, action } of routes.values()) {
		expect(loader, `the route ${id} has a loader, which guards it`).toBeDefined()
		expect(loader?.admits, `the loader of ${id} declares whom it admits`).toBe(admissions[id]?.loader)
		expect(action?.admits, `the action of ${id} declares whom it admits`).toBe(admissions[id]?.action)
		expect(action === undefined, `the table names the action of ${id}`).toBe(admissions[id]?.action === undefined)
	}
})

for (const [id, admission] of Object.entries(admissions)) {
	test(`${id} lets in whom it should, and nobody else`, async () => {
		const route = routes.get(id)
		if (!route) throw new Error(`the product has no route ${id}`)
		await walk(route, admission, "GET")
		await walk(route, admission, "POST")
	})
}

test("a volunteer sees no market day that they are not named on", async () => {
	const volunteers = ACTORS.filter((actor) => actor.name === "stall volunteer")
	const params = { ...yard.params, marketDay: yard.params.otherMarketDay ?? "" }
	const pages = [...routes.values()].filter((route) => route.path.startsWith("/stall/:producer/:day"))
	expect(pages.length).toBeGreaterThan(2)
	for (const route of pages) {
		for (const fields of [undefined, ...(route.action ? [yard.saleFields] : [])]) {
			const [answer] = await ask(volunteers, route, { params, ...(fields && { fields }) })
			expect([route.path, answer?.status]).toEqual([route.path, 404])
		}
	}
})

test("posts of those who are not admitted change nothing", async () => {
	// An order that waits to be confirmed, and a market day that is on: were anyone let in, it would show.
	const waiting = yard.params.placed ?? ""
	const before = await fingerprint(owner)
	for (const [id, { action, post }] of Object.entries(admissions)) {
		const route = routes.get(id)
		if (!route || action === undefined) continue
		const strangers = ACTORS.filter((actor) => verdict(action, actor) !== "admitted")
		const sale = route.path.startsWith("/stall/") ? yard.saleFields : {}
		const order: Record<string, string> = post?.fields?.number ? { number: waiting } : {}
		const fields = { ...(post?.effective ?? post?.fields), ...sale, ...order }
		const params = { ...yard.params, number: waiting, marketDay: yard.params.otherMarketDay ?? "" }
		await ask(strangers, route, { fields, params })
	}
	expect(await fingerprint(owner)).toEqual(before)
})
