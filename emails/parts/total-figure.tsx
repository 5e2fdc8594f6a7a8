import { formatMoney } from "~/domain/money"
import { color, type } from "../theme"

/** The figure at the foot of a table, over a double rule as wide as itself. */
export function TotalFigure({ cents }: { cents: number }) {
	return (
		<span
			style={{
				...type.sum,
				display: "inline-block",
				whiteSpace: "nowrap",
				padding: "9px 0 9px 14px",
				borderBottom: `3px double ${color.ink}`,
			}}
		>
			{formatMoney(cents)}
		</span>
	)
}
