import { z } from "zod"
import { piecesWords } from "~/domain/quantity"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { PlainTable } from "./parts/plain-table"
import { Lead, Note, Small, Title } from "./parts/text"
import { mailAddress, sampleYard, sentence, webAddress, words, yard } from "./props"
import { mistakeWords } from "./words"

/** The answer to a report of broken comb that gives no credit, with the producer's own sentence. */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	invoiceNumber: words,
	answer: sentence,
	lines: z
		.array(z.object({ productName: words, productNote: words.nullish(), reported: z.int().positive() }))
		.min(1)
		.max(1000),
	reportUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	invoiceNumber: "2026-0412",
	answer:
		"The picture shows weeping cappings, which are sound to eat and were graded so. Call me and we look at it together.",
	lines: [{ productName: "Round section, clover", productNote: "Fancy, 8 oz, case of 12", reported: 2 }],
	reportUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/breakage/6f0c5a52-3a2c-4f0e-9f6b-2f4f5f1d9a11",
} satisfies Props

export function subject({ yard, invoiceNumber }: Props): string {
	return `${yard.name}: no credit for what you reported of invoice ${invoiceNumber}`
}

export default function BreakageDeclined(props: Props) {
	const { yard, sentTo, storeName, invoiceNumber, answer, lines, reportUrl } = props
	return (
		<Frame title={subject(props)} preview={answer} yard={yard} about={[`Invoice ${invoiceNumber}`]} sentTo={sentTo}>
			<Title>We do not credit what you reported.</Title>
			<Lead>
				For {storeName}: comb reported broken, of invoice {invoiceNumber}. Nothing of the invoice has changed.
			</Lead>
			<Note>{answer}</Note>
			<Button href={reportUrl} words="Open the report" />
			<PlainTable
				heads={["You reported", "Credited"]}
				rows={lines.map(({ productName, productNote, reported }, index) => ({
					key: `${index}`,
					name: productName,
					note: productNote,
					figure: `none of ${piecesWords(reported)}`,
				}))}
			/>
			<Small lines={[mistakeWords(yard)]} />
		</Frame>
	)
}
