import { useLoaderData } from "react-router"
import { askedOf, openPool } from "../../bare/asked-of"
import { readRows } from "../../bare/read-rows"
import { rows } from "./rows"
import { Table } from "./table"

const pool = openPool()

export const meta = () => [{ title: "A table" }]

type Args = { url: URL; request: Request; params: { producer?: string; store?: string; day?: string } }

/** Asks the database all that the order sheet asks, and shows as many of the fixed rows as the address asks for. */
export async function loader({ url, request, params }: Args) {
	const asked = askedOf(params, request.headers.get("cookie"))
	if (!asked || !(await readRows(pool, asked))) throw new Response(null, { status: 404 })
	return { rows: rows.slice(0, Number(url.searchParams.get("rows"))) }
}

export default function ReadingPage() {
	return <Table shown={useLoaderData<typeof loader>().rows} />
}
