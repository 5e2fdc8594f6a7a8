import { z } from "zod"
import { fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { creditProps, creditSubject, sampleCredit } from "./documents/credit-props"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { PlainTable } from "./parts/plain-table"
import { Lead, Note, Small, Title } from "./parts/text"
import { mailAddress, sentence, webAddress, words } from "./props"
import { mistakeWords } from "./words"

/**
 * A credit, with the answer to the report that it comes from, where there was one; the PDF goes with the letter. `answer`
 * is the producer's own sentence and may be empty where all was accepted.
 */
export const schema = z.object({
	credit: creditProps,
	breakage: z
		.object({
			answer: sentence.or(z.literal("")),
			lines: z
				.array(
					z.object({
						productName: words,
						productNote: words.nullish(),
						reported: z.int().positive(),
						accepted: z.int().nonnegative(),
					}),
				)
				.max(1000),
		})
		.nullable(),
	sentTo: mailAddress,
	creditUrl: webAddress,
	pdfUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	credit: sampleCredit,
	breakage: {
		answer:
			"Four rounds were crushed in our van, and we are sorry. The fifth shows a scratch that was there when graded.",
		lines: [
			{ productName: "Round section, clover", productNote: "Fancy, 8 oz, case of 12", reported: 5, accepted: 4 },
			{ productName: "Basswood section, clover", productNote: "Fancy, 13 oz, case of 12", reported: 1, accepted: 1 },
		],
	},
	sentTo: "rosa@pantryandplume.example.test",
	creditUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/credits/C2026-0003",
	pdfUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/credits/C2026-0003.pdf",
} satisfies Props

export function subject({ credit }: Props): string {
	return `${credit.yard.name}: credit ${credit.number}, ${formatMoney(credit.totalCents)} for you`
}

/** The PDF that goes with the letter. Loaded only here, since the drawing of PDFs takes a second to load. */
export async function attachments({ credit }: Props) {
	const { renderCreditPdf } = await import("./documents/credit")
	const name = `credit-${credit.number.replace(/[^\w-]+/g, "-")}.pdf`
	return [{ filename: name, content: await renderCreditPdf(credit), contentType: "application/pdf" }]
}

export default function CreditIssued(props: Props) {
	const { credit, breakage, sentTo, creditUrl, pdfUrl } = props
	const { yard, number, issuedOn, reason } = credit
	return (
		<Frame
			title={subject(props)}
			preview={`${creditSubject(credit)}; the printed page comes with this letter.`}
			yard={yard}
			about={[`Credit ${number}`, fullDay(issuedOn)]}
			sentTo={sentTo}
		>
			<Title>
				We credit you <b style={{ fontWeight: 600 }}>{formatMoney(credit.totalCents)}</b>.
			</Title>
			<Lead>
				{creditSubject(credit)}. {settledSentence(credit)}
			</Lead>
			<Button href={creditUrl} words="Open the credit" beside={{ href: pdfUrl, words: "Printed page (PDF)" }} />
			{breakage ? (
				<PlainTable heads={["You reported", "Credited"]} rows={breakage.lines.map(answeredRow)} />
			) : (
				<PlainTable
					heads={["Product", "Amount"]}
					rows={credit.lines.map((line, index) => ({
						key: `${index}`,
						name: line.productName,
						note: line.productNote,
						figure: formatMoney(line.amountCents),
						figureNote: line.pieces > 0 ? piecesWords(line.pieces) : null,
					}))}
				/>
			)}
			{breakage?.answer ? <Note>{breakage.answer}</Note> : <Note>{reason}</Note>}
			<Small
				lines={[
					...(credit.taxCents > 0 ? [`Sales tax of ${formatMoney(credit.taxCents)} is in it.`] : []),
					mistakeWords(yard),
				]}
			/>
		</Frame>
	)
}

type AnsweredLine = NonNullable<Props["breakage"]>["lines"][number]

function answeredRow({ productName, productNote, reported, accepted }: AnsweredLine, index: number) {
	return {
		key: `${index}`,
		name: productName,
		note: productNote,
		figure: accepted === reported ? piecesWords(accepted) : `${accepted} of ${piecesWords(reported)}`,
	}
}

/** "It takes $40.00 off invoice 2026-0412; $7.98 stays on your account." */
function settledSentence({ settled, onAccountCents }: Props["credit"]): string {
	const parts = settled.map(({ invoiceNumber, cents }) => `takes ${formatMoney(cents)} off invoice ${invoiceNumber}`)
	if (onAccountCents === 0) return `It ${parts.join(" and ")}.`
	const rest = `${formatMoney(onAccountCents)} stays on your account`
	return parts.length > 0 ? `It ${parts.join(" and ")}; ${rest}.` : `All of it stays on your account.`
}
