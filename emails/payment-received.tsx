import { z } from "zod"
import { dayWords, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { SumTable } from "./parts/sum-table"
import { Lead, Note, Small, Title } from "./parts/text"
import { cents, day, mailAddress, sampleYard, webAddress, words, yard } from "./props"
import { mistakeWords } from "./words"

const wayWords = {
	card: "by card",
	bank: "from your bank",
	check: "by check",
	cash: "in cash",
	transfer: "by transfer",
} as const

/**
 * The receipt of one payment and where it went: `openCents` is what each invoice still asks afterwards,
 * `onAccountCents` what is over and kept. Refused when the parts do not sum to `amountCents`.
 */
export const schema = z
	.object({
		yard,
		sentTo: mailAddress,
		storeName: words,
		amountCents: cents.positive(),
		paidOn: day,
		way: z.enum(["card", "bank", "check", "cash", "transfer"]),
		reference: words.nullish(),
		/** The store has agreed that what falls due is taken by itself. */
		isAutomatic: z.boolean().optional(),
		applied: z.array(
			z.object({
				invoiceNumber: words,
				cents: cents.positive(),
				/** Taken off for paying early, beside what was paid. */
				discountCents: cents.nonnegative().optional(),
				openCents: cents.nonnegative(),
			}),
		),
		onAccountCents: cents.nonnegative(),
		invoicesUrl: webAddress,
	})
	.refine(
		({ applied, onAccountCents, amountCents }) =>
			applied.reduce((sum, part) => sum + part.cents, onAccountCents) === amountCents,
		{ path: ["amountCents"], message: "is not the sum of what it paid and what is kept on account" },
	)
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	amountCents: 112990,
	paidOn: "2026-08-27",
	way: "card",
	reference: "card ending 4242",
	applied: [
		{ invoiceNumber: "1203", cents: 92990, discountCents: 1898, openCents: 0 },
		{ invoiceNumber: "1211", cents: 20000, openCents: 14450 },
	],
	onAccountCents: 0,
	invoicesUrl: "https://waxbill.example.test/buy/larkmoor/invoices",
} satisfies Props

export function subject({ yard, amountCents }: Props): string {
	return `${yard.name} has your payment of ${formatMoney(amountCents)}`
}

export default function PaymentReceived(props: Props) {
	const { yard, sentTo, storeName, amountCents, paidOn, way, reference, applied, onAccountCents, invoicesUrl } = props
	const byItself = props.isAutomatic
		? ["It was taken by itself, as agreed; you can end that on your store’s pages."]
		: []
	const early = applied.filter(({ discountCents = 0 }) => discountCents > 0)
	const stillOpen = applied.filter((part) => part.openCents > 0)
	const kept = onAccountCents > 0 ? [{ label: "Kept on your account", cents: onAccountCents }] : []
	return (
		<Frame
			title={subject(props)}
			preview={`Paid ${wayWords[way]} on ${dayWords(paidOn)}.`}
			yard={yard}
			about={["Receipt", fullDay(paidOn)]}
			sentTo={sentTo}
		>
			<Title>
				We have your payment of <b style={{ fontWeight: 600 }}>{formatMoney(amountCents)}</b>, thank you.
			</Title>
			<Lead>
				For {storeName}, paid {wayWords[way]}
				{reference && ` (${reference})`} on {dayWords(paidOn)}.
			</Lead>
			<Button href={invoicesUrl} words="Open your invoices" />
			<SumTable
				head="Put to"
				parts={[...applied.map((part) => ({ label: `Invoice ${part.invoiceNumber}`, cents: part.cents })), ...kept]}
				total={{ label: "Paid", cents: amountCents }}
			/>
			{stillOpen.length + early.length > 0 && (
				<Note>
					{early.map(({ invoiceNumber, discountCents = 0 }) => (
						<div key={invoiceNumber}>
							Invoice {invoiceNumber}: {formatMoney(discountCents)} taken off for paying early.
						</div>
					))}
					{stillOpen.map((part) => (
						<div key={part.invoiceNumber}>
							On invoice {part.invoiceNumber} there is {formatMoney(part.openCents)} left to pay.
						</div>
					))}
				</Note>
			)}
			<Small lines={["This letter is your receipt.", ...byItself, mistakeWords(yard)]} />
		</Frame>
	)
}
