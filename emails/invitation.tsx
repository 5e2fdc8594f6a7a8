import { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { Lead, Small, Title } from "./parts/text"
import { day, mailAddress, sampleYard, webAddress, words, yard } from "./props"

const purposeOfRole = {
	owner: "run the desk",
	desk: "work at the desk: orders, invoices and payments",
	packer: "pick and pack the orders",
	stall: "sell at the market stall",
	buyer: "order comb",
	payer: "order and pay for comb",
} as const

/** An invitation to one role. A buyer or payer is invited for a store, which is then named. */
export const schema = z
	.object({
		yard,
		sentTo: mailAddress,
		role: z.enum(["owner", "desk", "packer", "stall", "buyer", "payer"]),
		storeName: words.nullish(),
		invitedBy: words,
		link: webAddress,
		expiresOn: day,
	})
	.refine(({ role, storeName }) => (role === "buyer" || role === "payer") === Boolean(storeName), {
		path: ["storeName"],
		message: "is for buyers and payers, and they need one",
	})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	role: "payer",
	storeName: "Pantry & Plume",
	invitedBy: "Ida Marsh",
	link: "https://waxbill.example.test/invitation/sample",
	expiresOn: "2026-04-14",
} satisfies Props

export function subject({ yard, storeName }: Props): string {
	return storeName ? `Order comb from ${yard.name} for ${storeName}` : `${yard.name} invites you to its desk`
}

export default function Invitation(props: Props) {
	const { yard, sentTo, role, storeName, invitedBy, link, expiresOn } = props
	const whom = storeName ? ` for ${storeName}` : ""
	return (
		<Frame title={subject(props)} preview={`${invitedBy} has invited you.`} yard={yard} sentTo={sentTo}>
			<Title>
				{invitedBy} invites you to {purposeOfRole[role]}
				{whom}.
			</Title>
			<Lead>
				{storeName
					? `You see what is in season and free for your delivery day, at your price, and keep a standing order if you like.`
					: `${yard.name} keeps its orders, packing and market days with Waxbill.`}{" "}
				There is no password: you sign in with a code sent to this address.
			</Lead>
			<Button href={link} words="Accept the invitation" />
			<Small lines={[`The invitation is good until ${dayWords(expiresOn)}. If you did not expect it, do nothing.`]} />
		</Frame>
	)
}
