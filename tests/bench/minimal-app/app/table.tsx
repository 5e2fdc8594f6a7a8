import type { rows } from "./rows"

/** Elements, attributes and text in about the shares of the product's order sheet; nothing is worked out. */
export function Table({ shown }: { shown: typeof rows }) {
	return (
		<main>
			<h1>A table</h1>
			<table className="ledger">
				<tbody>
					{shown.map((row) => (
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
