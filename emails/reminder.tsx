import { z } from "zod"
import { fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { PlainTable } from "./parts/plain-table"
import { Lead, Small, Title } from "./parts/text"
import { cents, day, mailAddress, sampleYard, webAddress, words, yard } from "./props"
import { mistakeWords } from "./words"

/** Reminds a store of invoices in the producer's own words, which come with their blanks filled; paragraphs by blank lines. */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	subject: words,
	body: z.string().trim().min(1).max(4000),
	invoices: z
		.array(z.object({ number: words, dueOn: day, openCents: cents, invoiceUrl: webAddress }))
		.min(1)
		.max(2000),
	invoicesUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	subject: "Larkmoor Bee Yard: $684.00 was due on August 1, 2026",
	body: "Dear Pantry & Plume,\n\nwe have not had $684.00 for invoice 2026-0187 yet, which was due on August 1, 2026. Would you look whether it was overlooked?\n\nThank you, Larkmoor Bee Yard",
	invoices: [
		{
			number: "2026-0187",
			dueOn: "2026-08-01",
			openCents: 68400,
			invoiceUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/invoices/2026-0187",
		},
	],
	invoicesUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/invoices",
} satisfies Props

export function subject(props: Props): string {
	return props.subject
}

export default function Reminder({ yard, sentTo, subject, body, invoices, invoicesUrl }: Props) {
	const open = invoices.reduce((sum, { openCents }) => sum + openCents, 0)
	const [only] = invoices
	return (
		<Frame title={subject} preview={subject} yard={yard} about={["Reminder"]} sentTo={sentTo}>
			<Title>{formatMoney(open)} still to pay.</Title>
			{body.split(/\n\s*\n/).map((paragraph, index) => (
				// biome-ignore lint/suspicious/noArrayIndexKey: paragraphs of a written letter are never reordered
				<Lead key={index}>{paragraph}</Lead>
			))}
			<PlainTable
				heads={["Invoice", "Still to pay"]}
				rows={invoices.map(({ number, dueOn, openCents }) => ({
					key: number,
					name: number,
					note: `due ${fullDay(dueOn)}`,
					figure: formatMoney(openCents),
				}))}
			/>
			<Button
				href={invoices.length === 1 && only ? only.invoiceUrl : invoicesUrl}
				words={invoices.length === 1 ? "Open the invoice" : "Open the invoices"}
			/>
			<Small lines={["Paid in the last days? Then this letter has crossed your payment.", mistakeWords(yard)]} />
		</Frame>
	)
}
