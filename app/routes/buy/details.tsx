import type { ReactNode } from "react"
import { Form, Link, redirect } from "react-router"
import { type Day, dayInZone, fullDay, instantAt, timeWords, type Weekday, weekdayName } from "~/domain/calendar"
import { termsWords } from "~/domain/invoicing/terms"
import { formatMoney } from "~/domain/money"
import { letterKinds } from "~/domain/people/letters"
import { now as askClock } from "~/platform/clock.server"
import { findStoreDetails, type StoreDetails } from "~/services/delivery/find-store-details.server"
import { findLettersOff, setLettersOff } from "~/services/people/set-letters-off.server"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { LettersForm } from "~/ui/messages/letters-form"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/details"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Our details · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, store, person } = scope
	const now = askClock()
	const details = await findStoreDetails({ producerId: producer.id, storeId: store.id, now, zone: producer.timeZone })
	return {
		frame: await findBuyFrame(scope, { part: "details", now }),
		details,
		today: dayInZone(now, producer.timeZone),
		lettersOff: await findLettersOff({ producerId: producer.id, storeId: store.id, personId: person.id }),
		email: person.email,
		isSaved: url.searchParams.has("saved"),
	}
})

/** Every letter that has no tick is switched off, so that a form without any switches all of them off. */
export const action = guard(admits.store("buyer", "payer"), async ({ request, url }: Route.ActionArgs, scope) => {
	const { producer, store, person } = scope
	const form = await request.formData()
	const wanted = form.getAll("letters").map(String)
	const off = letterKinds.filter((kind) => !wanted.includes(kind))
	await setLettersOff({ producerId: producer.id, storeId: store.id, personId: person.id, off })
	throw redirect(`${url.pathname}?saved`)
})

type Rounds = StoreDetails["rounds"]

/** A clock time in words; any day does, since no zone is asked for. */
const clockWords = (time: string) => timeWords(instantAt("2026-01-01", time, "UTC"), "UTC")

/** "Tuesday; last orders Friday at noon". */
function roundWords({ weekday, cutoffDaysBefore, cutoffTime }: Rounds[number]): string {
	const closes = (((weekday - 1 - cutoffDaysBefore) % 7) + 7) % 7
	return `${weekdayName(weekday as Weekday)}; last orders ${weekdayName((closes + 1) as Weekday)} at ${clockWords(cutoffTime)}`
}

function deliveryWords({ minimumCents, deliveryChargeCents, freeAboveCents }: StoreDetails["delivery"]): string {
	const charge = deliveryChargeCents === 0 ? "Free" : formatMoney(deliveryChargeCents)
	const free = freeAboveCents !== null && deliveryChargeCents > 0 ? `, free from ${formatMoney(freeAboveCents)}` : ""
	const minimum = minimumCents > 0 ? `; the minimum is ${formatMoney(minimumCents)}` : ""
	return `${charge}${free}${minimum}`
}

function certificateWords(until: Day | null, today: Day): string {
	if (until === null) return "none on file"
	return until < today ? `ran out on ${fullDay(until)}` : `on file, good until ${fullDay(until)}`
}

function Fact({ label, children }: { label: string; children: ReactNode }) {
	return (
		<div className="grid gap-1 border-b border-rule px-4 py-3 desk:grid-cols-[14rem_minmax(0,1fr)] desk:px-8">
			<dt className="text-ink-soft">{label}</dt>
			<dd>{children}</dd>
		</div>
	)
}

export default function Details({
	loaderData: { frame, details, today, lettersOff, email, isSaved },
}: Route.ComponentProps) {
	const { yard, people, rounds, resaleCertificateUntil } = details
	const whom = yard.contactName ?? yard.name
	return (
		<BuyBook frame={frame}>
			{isSaved && (
				<MessageLine tone="saved" title="Your letters are as you chose.">
					It holds from the next letter on.
				</MessageLine>
			)}
			<SheetHead
				title="Our details"
				lead={<>What {yard.name} knows of you. Call or write to have any of it changed.</>}
			/>
			<dl className="border-t-[1.5px] border-ink">
				<Fact label="Store">
					<b>{details.name}</b>
				</Fact>
				<Fact label="Delivered to">
					{details.address || "no address yet"}
					{details.receivingNote && <span className="note block">{details.receivingNote}</span>}
				</Fact>
				<Fact label="Delivery days">
					{rounds.length === 0
						? "none yet"
						: rounds.map((round) => (
								<span className="block" key={round.weekday}>
									{roundWords(round)}
								</span>
							))}
				</Fact>
				<Fact label="Delivery">{deliveryWords(details.delivery)}</Fact>
				<Fact label="Price list">
					{details.tierName}.{" "}
					<Link to="../prices" relative="path">
						Your prices
					</Link>
				</Fact>
				<Fact label="Invoices are">
					{termsWords(details.terms)}.{" "}
					<Link to="../statement" relative="path">
						Your statement
					</Link>
				</Fact>
				<Fact label="Resale certificate">
					{certificateWords(resaleCertificateUntil, today)}.{" "}
					<Link to="../certificate" relative="path">
						Hand in a certificate
					</Link>
				</Fact>
				<Fact label="Who orders and pays">
					{people.map((person) => (
						<span className="block" key={person.email}>
							<b>{person.name}</b>, {person.roles.includes("payer") ? "orders and pays" : "orders"}{" "}
							<span className="note">{person.email}</span>
						</span>
					))}
				</Fact>
				<Fact label="Letters to you">
					<Form method="post">
						<LettersForm off={lettersOff} email={email} />
					</Form>
				</Fact>
				<Fact label="Whom to call">
					<b>{whom}</b>
					{yard.contactName && ` at ${yard.name}`}
					{yard.phone && (
						<span className="block">
							<a href={`tel:${yard.phone.replace(/[^+\d]/g, "")}`}>{yard.phone}</a>
						</span>
					)}
					<span className="block">
						<a href={`mailto:${yard.email}`}>{yard.email}</a>
					</span>
				</Fact>
			</dl>
		</BuyBook>
	)
}
