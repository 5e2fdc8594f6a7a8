import { z } from "zod"
import { fullDay } from "~/domain/calendar"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { Lead, Small, Title } from "./parts/text"
import { day, mailAddress, sampleYard, webAddress, words, yard } from "./props"
import { mistakeWords } from "./words"

/** Tells a store before its resale certificate runs out, so that no sales tax has to be charged in between. */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	validUntil: day,
	certificateUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	validUntil: "2026-09-30",
	certificateUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/certificate",
} satisfies Props

export function subject({ validUntil, yard }: Props): string {
	return `${yard.name}: your resale certificate runs out on ${fullDay(validUntil)}`
}

export default function CertificateExpiring(props: Props) {
	const { yard, sentTo, storeName, validUntil, certificateUrl } = props
	return (
		<Frame
			title={subject(props)}
			preview="After that day sales tax is charged where it applies."
			yard={yard}
			about={["Resale certificate"]}
			sentTo={sentTo}
		>
			<Title>
				The certificate of {storeName} is good until {fullDay(validUntil)}.
			</Title>
			<Lead>
				After that day invoices bear sales tax where it applies. Send the new certificate as a PDF or a photo, and
				nothing changes.
			</Lead>
			<Button href={certificateUrl} words="Hand in the new certificate" />
			<Small lines={["Local rules decide what is taxed and which certificate counts.", mistakeWords(yard)]} />
		</Frame>
	)
}
