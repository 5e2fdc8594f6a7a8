import { useLoaderData } from "react-router"
import { rows } from "./rows"

export const meta = () => [{ title: "A table" }]

/** As many of the fixed rows as the address asks for: that sets the size of the page. */
export function loader({ url }: { url: URL }) {
	return { rows: rows.slice(0, Number(url.searchParams.get("rows"))) }
}

/** Elements, attributes and text in about the shares of the product's order sheet; nothing is read or worked out. */
export default function Page() {
	const data = useLoaderData<typeof loader>()
	return (
		<main>
			<h1>A table</h1>
			<table className="ledger">
				<tbody>
					{data.rows.map((row) => (
						<tr key={row.id}>
							<td className="no">{row.code}</td>
							<td className="product">
								<span className="name">{row.name}</span>
								<span className="note">{row.detail}</span>
							</td>
							<td className="num pieces">{row.pieces}</td>
							<td className="num break">{row.cents / 100}</td>
							<td className="num field-cell">
								<input
									id={`field-${row.id}`}
									type="text"
									inputMode="numeric"
									autoComplete="off"
									className="qty"
									aria-label={`Cases of ${row.name}`}
									name={row.id}
									defaultValue=""
								/>
							</td>
						</tr>
					))}
				</tbody>
			</table>
		</main>
	)
}
