import { z } from "zod"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { Lead, Row, Small, Title } from "./parts/text"
import { mailAddress, webAddress } from "./props"
import { type } from "./theme"

/** The code and link that sign one address in. `link` opens a page; only a press on that page signs in. */
export const schema = z.object({
	sentTo: mailAddress,
	code: z.string().regex(/^\d{6}$/),
	link: webAddress,
	minutesValid: z.int().positive(),
})
type Props = z.infer<typeof schema>

export const sample = {
	sentTo: "rosa@pantryandplume.example.test",
	code: "407193",
	link: "https://waxbill.example.test/sign-in/link?t=sample",
	minutesValid: 10,
} satisfies Props

/** The code stays out of the subject: a locked telephone shows subjects to whoever stands beside it. */
export function subject(_props: Props): string {
	return "Your code to sign in to Waxbill"
}

export default function SignInCode(props: Props) {
	const { sentTo, code, link, minutesValid } = props
	return (
		<Frame title={subject(props)} preview={`Good for ${minutesValid} minutes, once.`} sentTo={sentTo}>
			<Title>Your code to sign in</Title>
			<Row above={8} below={14}>
				<div style={type.code}>{code}</div>
			</Row>
			<Lead>
				Type it on the page that asked for it, within {minutesValid} minutes. Or open the link, on this device or
				another.
			</Lead>
			<Button href={link} words="Open the sign-in page" />
			<Small lines={["It works once. If you did not ask for this, do nothing: nobody gets in without the code."]} />
		</Frame>
	)
}
