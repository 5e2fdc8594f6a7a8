import { color } from "../theme"
import { gapAfter, type StripCell, type StripLayout, stripCells } from "./strip-cells"

/** The fill strip of one line, drawn with table cells so that it shows where pictures are blocked. */
export function Strip({ given, asked }: { given: number; asked: number }) {
	const { rows, size, label } = stripCells(given, asked)
	return (
		// The words under the strip say the same; in the text version the cells would be rows of blanks.
		<div data-skip-in-text role="img" aria-label={label}>
			{rows.map((row, index) => (
				// biome-ignore lint/suspicious/noArrayIndexKey: the rows of a strip have no other name and never move
				<StripRow key={index} row={row} size={size} last={index === rows.length - 1} />
			))}
		</div>
	)
}

function StripRow({ row, size, last }: { row: StripCell[]; size: StripLayout["size"]; last: boolean }) {
	const blank = { fontSize: "1px", lineHeight: "1px" }
	return (
		<table
			role="presentation"
			cellPadding="0"
			cellSpacing="0"
			border={0}
			style={last ? undefined : { marginBottom: "4px" }}
		>
			<tbody>
				<tr>
					{row.flatMap((cell, index) => {
						const gap = gapAfter(index, row.length, size)
						const edge = cell === "given" ? color.stock : color.propolis
						return [
							<td
								// biome-ignore lint/suspicious/noArrayIndexKey: cells are counted, not named
								key={`cell-${index}`}
								style={{
									...blank,
									width: `${size.width}px`,
									height: `${size.height - 2}px`,
									background: cell === "given" ? color.stock : undefined,
									borderBottom: `2px solid ${edge}`,
								}}
							>
								&nbsp;
							</td>,
							gap > 0 && (
								// biome-ignore lint/suspicious/noArrayIndexKey: cells are counted, not named
								<td key={`gap-${index}`} style={{ ...blank, width: `${gap}px` }}>
									&nbsp;
								</td>
							),
						]
					})}
				</tr>
			</tbody>
		</table>
	)
}
