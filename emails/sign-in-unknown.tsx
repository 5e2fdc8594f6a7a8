import { z } from "zod"
import { Frame } from "./parts/frame"
import { Lead, Small, Title } from "./parts/text"
import { mailAddress } from "./props"

/** For an address that nobody uses here; the page that asked says the same to everyone. */
export const schema = z.object({ sentTo: mailAddress })
type Props = z.infer<typeof schema>

export const sample = { sentTo: "someone@quillandrye.example.test" } satisfies Props

export function subject(_props: Props): string {
	return "Signing in to Waxbill"
}

export default function SignInUnknown(props: Props) {
	return (
		<Frame title={subject(props)} preview="Nobody at a desk here uses this address." sentTo={props.sentTo}>
			<Title>Nobody at a desk here uses this address.</Title>
			<Lead>
				Someone asked for a code to sign in with it. If that was you, try the address that your invitation came to, or
				ask the producer you buy from or work with to invite this one.
			</Lead>
			<Small lines={["If you did not ask for this, do nothing."]} />
		</Frame>
	)
}
