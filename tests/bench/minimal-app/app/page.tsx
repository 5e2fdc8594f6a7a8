import { useLoaderData } from "react-router"
import { rows } from "./rows"
import { Table } from "./table"

export const meta = () => [{ title: "A table" }]

/** As many of the fixed rows as the address asks for: that sets the size of the page. Nothing is read. */
export function loader({ url }: { url: URL }) {
	return { rows: rows.slice(0, Number(url.searchParams.get("rows"))) }
}

export default function Page() {
	return <Table shown={useLoaderData<typeof loader>().rows} />
}
