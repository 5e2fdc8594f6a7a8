import { z } from "zod"
import { fullDay } from "~/domain/calendar"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { Lead, Note, Small, Title } from "./parts/text"
import { day, mailAddress, sampleYard, sentence, webAddress, words, yard } from "./props"
import { mistakeWords } from "./words"

/** Answers a store that has handed in a resale certificate: until when it holds, or why it does not. */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	number: words,
	/** Null where it was refused. */
	validUntil: day.nullable(),
	reason: sentence.nullable(),
	certificateUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	number: "R-204-118",
	validUntil: null,
	reason: "The photo cuts off the signature. Please send the whole page.",
	certificateUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/certificate",
} satisfies Props

export function subject({ yard, validUntil }: Props): string {
	return validUntil
		? `${yard.name}: your resale certificate is on file until ${fullDay(validUntil)}`
		: `${yard.name}: please look at your resale certificate again`
}

export default function CertificateAnswer(props: Props) {
	const { yard, sentTo, storeName, number, validUntil, reason, certificateUrl } = props
	return (
		<Frame
			title={subject(props)}
			preview={`Certificate ${number} of ${storeName}.`}
			yard={yard}
			about={["Resale certificate", number]}
			sentTo={sentTo}
		>
			<Title>
				{validUntil ? `It is on file, good until ${fullDay(validUntil)}.` : "It could not be taken as it is."}
			</Title>
			{reason && <Note>{reason}</Note>}
			<Lead>
				{validUntil
					? "What you buy for resale bears no sales tax until then."
					: "Until a certificate is on file, invoices bear sales tax where it applies."}
			</Lead>
			<Button href={certificateUrl} words={validUntil ? "Open our certificate" : "Hand it in again"} />
			<Small lines={["Local rules decide what is taxed and which certificate counts.", mistakeWords(yard)]} />
		</Frame>
	)
}
