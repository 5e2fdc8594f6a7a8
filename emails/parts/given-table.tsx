import { joinKnown, shortSentences } from "../words"
import { LineTable } from "./line-table"
import { stripCaption } from "./strip-cells"
import { Note } from "./text"

interface GivenTableProps {
	casesHead: string
	lines: readonly {
		productName: string
		productNote?: string | null
		lots?: readonly string[]
		casesAsked: number
		casesGiven: number
		priceCents: number
		amountCents: number
		reason?: string | null
	}[]
	charges: readonly { label: string; cents: number }[]
	total: { label: string; cents: number }
}

/** The table of what a store gets, and under it, for each line that is short, the sentence that says why. */
export function GivenTable({ casesHead, lines, charges, total }: GivenTableProps) {
	const sentences = shortSentences(lines)
	return (
		<>
			<LineTable
				casesHead={casesHead}
				lines={lines.map((line) => ({
					name: line.productName,
					note: joinKnown([line.productNote, lotWords(line.lots)], "; "),
					cases: stripCaption(line.casesGiven, line.casesAsked),
					strip: { given: line.casesGiven, asked: line.casesAsked },
					priceCents: line.priceCents,
					amount: line.amountCents,
				}))}
				charges={charges}
				total={total}
			/>
			{sentences.length > 0 && (
				<Note>
					{sentences.map((sentence) => (
						<div key={sentence}>{sentence}</div>
					))}
				</Note>
			)}
		</>
	)
}

function lotWords(lots: readonly string[] = []): string | null {
	if (lots.length === 0) return null
	return `${lots.length === 1 ? "lot" : "lots"} ${lots.join(", ")}`
}
