import { z } from "zod"
import { fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { sampleStatement, statementProps } from "./documents/statement-props"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { SumTable } from "./parts/sum-table"
import { Lead, Small, Title } from "./parts/text"
import { cents, type DrawElsewhere, mailAddress, webAddress } from "./props"
import { mistakeWords } from "./words"

/**
 * A store's statement, sent by the producer; the whole of it goes with the letter as a PDF. One that is too long for a letter
 * comes without lines, and is opened by the links. What raised the balance and what lowered it are sums in cents.
 */
export const schema = z.object({
	statement: statementProps,
	isTooLong: z.boolean(),
	raisedCents: cents,
	loweredCents: cents,
	sentTo: mailAddress,
	statementUrl: webAddress,
	pdfUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	statement: sampleStatement,
	isTooLong: false,
	raisedCents: 92990,
	loweredCents: -69588,
	sentTo: "rosa@pantryandplume.example.test",
	statementUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/statement",
	pdfUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/statement.pdf",
} satisfies Props

export function subject({ statement }: Props): string {
	const { yard, range, closingCents } = statement
	const owed = closingCents > 0 ? `, ${formatMoney(closingCents)} owed` : ""
	return `${yard.name}: statement until ${fullDay(range.until)}${owed}`
}

/** The PDF that goes with the letter. Loaded only here, since the drawing of PDFs takes a second to load. */
export async function attachments({ statement, isTooLong }: Props, draw?: DrawElsewhere) {
	if (isTooLong) return []
	const filename = `statement-${statement.range.until}.pdf`
	const drawn = await draw?.("draw-statements", statement)
	const content = drawn
		? Buffer.from(drawn)
		: await (await import("./documents/statement")).renderStatementPdf(statement)
	return [{ filename, content, contentType: "application/pdf" }]
}

export default function Statement(props: Props) {
	const { statement, isTooLong, raisedCents, loweredCents, sentTo, statementUrl, pdfUrl } = props
	const { yard, store, range, broughtForwardCents, closingCents, ageing } = statement
	const where = isTooLong
		? "It has too many lines for a letter: every one stands on the printed pages behind the link."
		: "Every line is in the printed pages with this letter."
	const late = ageing.slice(1).reduce((sum, { cents }) => sum + cents, 0)
	return (
		<Frame
			title={subject(props)}
			preview={`From ${fullDay(range.from)} until ${fullDay(range.until)}.`}
			yard={yard}
			about={["Statement", fullDay(range.until)]}
			sentTo={sentTo}
		>
			<Title>
				{closingCents > 0 ? (
					<>
						{store.name} owes <b style={{ fontWeight: 600 }}>{formatMoney(closingCents)}</b>.
					</>
				) : (
					`${store.name} owes nothing.`
				)}
			</Title>
			<Lead>
				This is what {yard.name} has written down from {fullDay(range.from)} until {fullDay(range.until)}.
				{late > 0 && ` ${formatMoney(late)} is past its due date.`}
			</Lead>
			<Button href={statementUrl} words="Open the statement" beside={{ href: pdfUrl, words: "Printed pages (PDF)" }} />
			<SumTable
				head="In these days"
				parts={[
					{ label: "Brought forward", cents: broughtForwardCents },
					{ label: "Invoiced, and paid back to you", cents: raisedCents },
					{ label: "Paid, credited and taken off", cents: loweredCents },
				]}
				total={{ label: closingCents < 0 ? "In your favor" : "Owed", cents: closingCents }}
			/>
			<Small lines={[where, mistakeWords(yard)]} />
		</Frame>
	)
}
