import { useState } from "react"
import { dayWords } from "~/domain/calendar"
import { Button } from "~/ui/forms/button"
import { MessageLine } from "~/ui/layout/sheet"
import { CheckForm, type CheckPlace } from "./check-form"
import { sharesWords } from "./check-words"
import type { KeptChecksState } from "./kept-checks-hook"
import type { KeptCheck } from "./kept-checks-store"

const counted = (count: number) => (count === 1 ? "1 check" : `${count} checks`)
const waits = (count: number) => `${counted(count)} ${count === 1 ? "waits" : "wait"}`

type KeptChecksProps = { book: KeptChecksState; place: CheckPlace; signInHref: string }

/** What this phone keeps that the server has not taken, and what can be done about it. Nothing while there is nothing. */
export function KeptChecks({ book, place, signInHref }: KeptChecksProps) {
	const mine = book.kept.filter(({ madeBy }) => madeBy.id === place.person.id)
	const waiting = mine.filter(({ refused }) => refused === null)
	const refused = mine.filter((check) => check.refused !== null)
	const others = book.kept.filter(({ madeBy }) => madeBy.id !== place.person.id)
	return (
		<div className="kept-checks">
			{waiting.length > 0 && <WaitingLine {...{ book, signInHref }} count={waiting.length} />}
			{waiting.length === 0 && refused.length === 0 && book.taken.length > 0 && (
				<MessageLine tone="saved" title={`${takenWords(book.taken)} recorded.`} />
			)}
			{others.length > 0 && <OthersLine others={others} />}
			{refused.length > 0 && (
				<MessageLine
					tone="problem"
					title={`${counted(refused.length)} ${refused.length === 1 ? "was" : "were"} not taken.`}
				>
					The reason stands with each.
				</MessageLine>
			)}
			{mine.length > 0 && (
				<ul className="kept-list" aria-label="Checks kept on this phone">
					{mine.map((check) => (
						<KeptRow key={check.id} {...{ check, book, place }} />
					))}
				</ul>
			)}
		</div>
	)
}

function takenWords(taken: readonly KeptCheck[]): string {
	const last = taken.at(-1)
	return taken.length === 1 && last ? `The check of ${last.about.name} is` : `${counted(taken.length)} are`
}

function WaitingLine({ book, count, signInHref }: { book: KeptChecksState; count: number; signInHref: string }) {
	const send = (
		<Button type="button" onClick={book.send}>
			Send now
		</Button>
	)
	switch (book.state) {
		case "sending":
			return <MessageLine tone="signal" title={`${counted(count)} on the way.`} />
		case "sign-in":
			return (
				<MessageLine
					tone="problem"
					title={`${waits(count)}: sign in to send.`}
					action={<a href={signInHref}>Sign in</a>}
				>
					Nothing is lost; this phone keeps {count === 1 ? "it" : "them"}.
				</MessageLine>
			)
		case "not-admitted":
			return (
				<MessageLine
					tone="problem"
					title={`${waits(count)}, but you may not record checks here any more.`}
					action={send}
				>
					Ask the owner of the yard.
				</MessageLine>
			)
		case "trouble":
			return (
				<MessageLine tone="problem" title={`${counted(count)} could not be sent.`} action={send}>
					This phone keeps {count === 1 ? "it" : "them"}. Try again in a moment.
				</MessageLine>
			)
		default:
			return (
				<MessageLine tone="signal" title={`${waits(count)} for signal.`} action={send}>
					This phone keeps {count === 1 ? "it" : "them"} until then.
				</MessageLine>
			)
	}
}

function OthersLine({ others }: { others: readonly KeptCheck[] }) {
	const names = [...new Set(others.map(({ madeBy }) => madeBy.name))].join(" and ")
	return (
		<MessageLine tone="signal" title={`${waits(others.length)} that ${names} made.`}>
			{others.length === 1 ? "It goes" : "They go"} when {names} signs in on this phone.
		</MessageLine>
	)
}

function KeptRow({ check, book, place }: { check: KeptCheck; book: KeptChecksState; place: CheckPlace }) {
	const [isOpen, setOpen] = useState(false)
	const { about, seen, refused, photo } = check
	return (
		<li>
			<div className="kept-row">
				<div>
					<h2 className="name">{about.name}</h2>
					<p>
						{dayWords(seen.checkedOn)}: {sharesWords(seen)}
						{photo && ", with a photo"}
					</p>
					{refused?.errors.map(({ message }) => (
						<p className="field-error" key={message}>
							{message}
						</p>
					))}
				</div>
				<div className="kept-actions">
					<Button type="button" aria-expanded={isOpen} onClick={() => setOpen(!isOpen)}>
						{isOpen ? "Leave it" : "Mend it"}
						<span className="sr-only">: {about.name}</span>
					</Button>
					<Button type="button" onClick={() => book.drop(check.id)}>
						Throw it away
						<span className="sr-only">: {about.name}</span>
					</Button>
				</div>
			</div>
			{isOpen && (
				<CheckForm
					id={`kept-${check.id}`}
					place={place}
					about={about}
					checkId={refused?.newId ?? check.id}
					last={null}
					fields={check.fields}
					errors={refused?.errors ?? []}
					photo={photo}
					submitLabel="Record it so"
					onKeep={async (mended) => {
						await book.keep(mended)
						if (mended.id !== check.id) await book.drop(check.id)
						setOpen(false)
					}}
				/>
			)}
		</li>
	)
}
