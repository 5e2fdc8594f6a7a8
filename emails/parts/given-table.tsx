import { poundPriceWords } from "~/domain/invoicing/weighed-words"
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
		/** Said where the price is that of a pound. */
		netWeight?: string | null
		poundCents?: number | null
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
					note: joinKnown([line.productNote, lotWords(line.lots), line.poundCents ? line.netWeight : null], "; "),
					cases: line.casesAsked > 0 ? stripCaption(line.casesGiven, line.casesAsked) : "",
					...(line.casesAsked > 0 ? { strip: { given: line.casesGiven, asked: line.casesAsked } } : {}),
					priceCents: line.priceCents,
					priceWords: priceWords(line),
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

function priceWords({ casesAsked, poundCents }: GivenTableProps["lines"][number]): string | undefined {
	if (casesAsked === 0) return ""
	return poundCents ? poundPriceWords(poundCents) : undefined
}

function lotWords(lots: readonly string[] = []): string | null {
	if (lots.length === 0) return null
	return `${lots.length === 1 ? "lot" : "lots"} ${lots.join(", ")}`
}
