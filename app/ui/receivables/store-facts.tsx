import type { ReactNode } from "react"
import { Link } from "react-router"
import { type Day, fullDay, type Weekday, weekdayName } from "~/domain/calendar"
import { type Ageing, ageingBuckets } from "~/domain/invoicing/ageing"
import { formatMoney } from "~/domain/money"
import { casesWords } from "~/domain/quantity"
import { stepWords } from "~/domain/receivables/reminders"
import { AgeingBar, AgeingPatterns } from "./ageing-picture"
import { AgeingList } from "./statement-sheet"

type Owed = { ageing: Ageing; owedCents: number; onAccountCents: number; onItsWayCents: number }
type Open = { number: string; dueOn: Day; openCents: number }

const SHOWN = 6

/** What the store owes now, by days late, and the invoices that are open longest. */
export function StoreOwed({
	owed,
	invoices,
	today,
	base,
	statementHref,
}: {
	owed: Owed
	invoices: readonly Open[]
	today: Day
	base: string
	statementHref: string
}) {
	const { ageing, owedCents, onAccountCents, onItsWayCents } = owed
	const lateCents = ageingBuckets.slice(1).reduce((sum, bucket) => sum + ageing[bucket], 0)
	return (
		<section className="border-t-[1.5px] border-ink" aria-labelledby="owed-head">
			<h2 className="head-italic px-4 pt-4 desk:px-8" id="owed-head">
				What is owed
			</h2>
			<p className="px-4 pt-1 desk:px-8">
				{owedCents === 0 ? "Nothing is open." : `${formatMoney(owedCents)} is open`}
				{owedCents > 0 &&
					(lateCents > 0 ? (
						<span className="short">, {formatMoney(lateCents)} of it late.</span>
					) : (
						", none of it late."
					))}
				{onAccountCents > 0 && ` ${formatMoney(onAccountCents)} is on account.`}
				{onItsWayCents > 0 && ` ${formatMoney(onItsWayCents)} is on its way from the bank.`}
			</p>
			{owedCents > 0 && (
				<>
					<AgeingPatterns />
					<AgeingList ageing={ageing} />
					<div className="px-4 pb-3 desk:px-8">
						<AgeingBar ageing={ageing} mostCents={owedCents} label={`${formatMoney(owedCents)} by days late, drawn`} />
					</div>
				</>
			)}
			<p className="flex flex-wrap gap-x-5 px-4 pb-4 desk:px-8">
				{invoices.slice(0, SHOWN).map(({ number, dueOn, openCents }) => (
					<span key={number}>
						<Link className="inline-block py-1" to={`${base}/invoices/${number}`}>
							{number}
						</Link>
						, {formatMoney(openCents)} <span className={dueOn < today ? "short" : "note"}>due {fullDay(dueOn)}</span>
					</span>
				))}
				{invoices.length > SHOWN && (
					<Link className="inline-block py-1" to={statementHref}>
						All on the statement
					</Link>
				)}
			</p>
		</section>
	)
}

function Fact({ label, children }: { label: string; children: ReactNode }) {
	return (
		<div className="grid gap-1 border-b border-rule px-4 py-3 desk:grid-cols-[14rem_minmax(0,1fr)] desk:px-8">
			<dt className="text-ink-soft">{label}</dt>
			<dd>{children}</dd>
		</div>
	)
}

type Facts = {
	terms: { remindersHeld: boolean }
	waysToPay: { words: string; isAutomatic: boolean; agreedBy: string | null; agreedOn: Day | null }
	resaleCertificateUntil: Day | null
	certificatesWaiting: number
	rounds: readonly number[]
	people: readonly { name: string; email: string; pays: boolean }[]
	orders: readonly { number: number; deliveryOn: Day; state: string; cases: number }[]
	reminders: readonly { on: Day; daysAfterDue: number; invoices: string[] }[]
}

/** What is known of the store and set elsewhere: how it pays, its certificate, its people, its last orders and letters. */
export function StoreFacts({ facts, base, here, today }: { facts: Facts; base: string; here: string; today: Day }) {
	const { waysToPay, people, orders, reminders, rounds, certificatesWaiting } = facts
	return (
		<dl className="border-t-[1.5px] border-ink">
			<Fact label="Kept way to pay">
				{waysToPay.words || "none"}
				{waysToPay.isAutomatic &&
					`; taken by itself when it falls due${waysToPay.agreedBy ? `, as ${waysToPay.agreedBy} agreed` : ""}${waysToPay.agreedOn ? ` on ${fullDay(waysToPay.agreedOn)}` : ""}`}
			</Fact>
			<Fact label="Resale certificate">
				<Certificate until={facts.resaleCertificateUntil} today={today} />{" "}
				<Link className="inline-block py-1" to={`${here}/certificate`}>
					{certificatesWaiting > 0 ? "One waits for your answer" : "Certificates"}
				</Link>
			</Fact>
			<Fact label="Delivered on">
				{rounds.length === 0 ? "no day yet" : rounds.map((day) => weekdayName(day as Weekday)).join(", ")}
			</Fact>
			<Fact label="Who orders and pays">
				{people.length === 0 && "nobody yet"}
				{people.map(({ name, email, pays }) => (
					<span className="block" key={email}>
						<b>{name}</b>, {pays ? "orders and pays" : "orders"} <span className="note">{email}</span>
					</span>
				))}
			</Fact>
			<Fact label="Last orders">
				{orders.length === 0 && "none yet"}
				{orders.map(({ number, deliveryOn, state, cases }) => (
					<span className="block" key={number}>
						<Link className="inline-block py-1" to={`${base}/orders/${number}`}>
							Order {number}
						</Link>{" "}
						for {fullDay(deliveryOn)}, {casesWords(cases)}, {state}
					</span>
				))}
			</Fact>
			<Fact label="Reminders">
				{facts.terms.remindersHeld && <span className="block">Held for this store.</span>}
				{reminders.length === 0 && !facts.terms.remindersHeld && "none written yet"}
				{reminders.map(({ on, daysAfterDue, invoices }) => (
					<span className="block" key={`${on} ${daysAfterDue} ${invoices[0]}`}>
						{fullDay(on)}: {stepWords(daysAfterDue)}, for {invoices.slice(0, 5).join(", ")}
						{invoices.length > 5 && ` and ${invoices.length - 5} more`}
					</span>
				))}
			</Fact>
		</dl>
	)
}

function Certificate({ until, today }: { until: Day | null; today: Day }) {
	if (!until) return <>None on file: sales tax is charged where it applies.</>
	if (until < today)
		return <span className="short">Ran out on {fullDay(until)}: sales tax is charged where it applies.</span>
	return <>On file, good until {fullDay(until)}.</>
}
