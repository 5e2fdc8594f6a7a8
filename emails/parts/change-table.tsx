import { formatMoney } from "~/domain/money"
import { PlainTable } from "./plain-table"

/** The lines that a late change touches, and what they come to before and after. */
export function ChangeTable({
	lines,
	beforeCents,
	afterCents,
}: {
	lines: readonly { productName: string; productNote?: string | null; change: string }[]
	beforeCents: number
	afterCents: number
}) {
	return (
		<PlainTable
			heads={["Product", "Change"]}
			rows={[
				...lines.map(({ productName, productNote, change }) => ({
					key: productName,
					name: productName,
					note: productNote,
					figure: change,
				})),
				{
					key: "these lines come to",
					name: "These lines come to",
					figure: formatMoney(afterCents),
					figureNote: `before ${formatMoney(beforeCents)}`,
				},
			]}
		/>
	)
}
