import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, fullDay } from "~/domain/calendar"
import { readDay } from "~/domain/pricing/read-figures"
import { now as askClock } from "~/platform/clock.server"
import { answerCertificate } from "~/services/certificates/answer-certificate.server"
import { listCertificates } from "~/services/certificates/list-certificates.server"
import { findStoreBySlug } from "~/services/standing-orders/find-store-by-slug.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { CertificateRows } from "~/ui/receivables/certificate-rows"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/certificate"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { typedFields } from "./store-form"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `Resale certificate of ${loaderData?.storeName ?? "a store"} · Waxbill` },
]

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const store = await findStoreBySlug({ producerId: producer.id, slug: params.store })
	if (!store) throw data(null, { status: 404 })
	const now = askClock()
	const zone = producer.timeZone
	const { validUntil, certificates } = await listCertificates({ producerId: producer.id, storeId: store.id })
	return {
		frame: await findDeskFrame(scope, { part: "stores", now }),
		storeName: store.name,
		validUntil,
		today: dayInZone(now, zone),
		certificates: certificates.map(({ handedInAt, ...one }) => ({ ...one, handedInOn: dayInZone(handedInAt, zone) })),
		isAnswered: url.searchParams.has("answered"),
	}
})

const FAULTS = {
	"no-such-certificate": { message: "This certificate is not there." },
	"answered-already": { message: "This certificate has been answered already." },
	expired: { field: "until", message: "That day has passed. Choose a later one, or refuse the certificate." },
} as const

export const action = guard(admits.desk("owner", "desk"), async ({ request, url }: Route.ActionArgs, scope) => {
	const { producer, person } = scope
	const typed = typedFields(await request.formData())
	const refuse = (status: number, ...errors: { field?: string; message: string }[]) =>
		data({ errors, typed }, { status })
	const id = z.guid().safeParse(typed.certificateId)
	if (!id.success) return refuse(422, { message: "Choose a certificate of the list." })
	const now = askClock()
	const until = readDay(typed.until ?? "")
	const sentence = (typed.sentence ?? "").trim()
	const isAccepting = typed.intent === "accept"
	if (isAccepting && !until) return refuse(422, { field: "until", message: "Write the last day it is good." })
	if (!isAccepting && (sentence === "" || sentence.length > 500)) {
		return refuse(422, {
			field: "sentence",
			message: "Write in a sentence why, up to 500 characters. The store reads it.",
		})
	}
	const answered = await answerCertificate({
		producerId: producer.id,
		certificateId: id.data,
		personId: person.id,
		answer: isAccepting && until ? { accepted: true, until } : { accepted: false, sentence },
		today: dayInZone(now, producer.timeZone),
		now,
	})
	if (!answered.ok) return refuse(422, FAULTS[answered.reason])
	throw redirect(`${url.pathname}?answered`)
})

export default function DeskCertificate({ loaderData, actionData, params }: Route.ComponentProps) {
	const { storeName, validUntil, certificates, today, isAnswered } = loaderData
	const base = `/desk/${params.producer}`
	const errors: readonly { field?: string; message: string }[] = actionData?.errors ?? []
	const typed: Record<string, string> = actionData?.typed ?? {}
	const idOf = (field: string, id: string) => `field-${field}-${id}`
	return (
		<DeskBook frame={loaderData.frame}>
			{isAnswered && !actionData && (
				<MessageLine tone="saved" title="Answered.">
					The store gets a letter.
				</MessageLine>
			)}
			<SheetHead
				title={`Resale certificate of ${storeName}`}
				lead={
					validUntil
						? `On file, good until ${fullDay(validUntil)}. Local rules decide which certificate counts and what it covers.`
						: "None is on file. Local rules decide which certificate counts and what it covers."
				}
				action={<Link to={`${base}/stores/${params.store}`}>{storeName}</Link>}
			/>
			<ErrorSummary errors={errors} idOf={(field) => idOf(field, typed.certificateId ?? "")} />
			{certificates.length === 0 ? (
				<EmptyLine>The store has handed in none. It does so on its page “Our details”.</EmptyLine>
			) : (
				<CertificateRows
					certificates={certificates}
					today={today}
					more={({ id, state, validUntil: said }) => (
						<>
							{/* A file, not a page: the router leaves it to the browser. */}
							<Link className="inline-block py-1" to={`${base}/certificates/${id}`} reloadDocument>
								Save the file and look at it
							</Link>
							{state === "handed-in" && (
								<AnswerForms
									id={id}
									until={typed.certificateId === id ? (typed.until ?? said) : said}
									sentence={typed.certificateId === id ? (typed.sentence ?? "") : ""}
									errorOf={(field) =>
										typed.certificateId === id ? errors.find((error) => error.field === field)?.message : undefined
									}
									idOf={(field) => idOf(field, id)}
								/>
							)}
						</>
					)}
				/>
			)}
		</DeskBook>
	)
}

function AnswerForms(props: {
	id: string
	until: string
	sentence: string
	errorOf: (field: string) => string | undefined
	idOf: (field: string) => string
}) {
	const { id, until, sentence, errorOf, idOf } = props
	return (
		<div className="grid items-start gap-6 pt-3 desk:grid-cols-2">
			<Form method="post" noValidate className="grid gap-3" aria-label="Accept the certificate">
				<input type="hidden" name="certificateId" value={id} />
				<TextField
					label="Good until"
					type="date"
					name="until"
					id={idOf("until")}
					defaultValue={until}
					error={errorOf("until")}
				/>
				<div>
					<Button variant="primary" name="intent" value="accept">
						Accept it until that day
					</Button>
				</div>
			</Form>
			<Form method="post" noValidate className="grid gap-3" aria-label="Refuse the certificate">
				<input type="hidden" name="certificateId" value={id} />
				<TextField
					label="Why it cannot be taken"
					name="sentence"
					id={idOf("sentence")}
					autoComplete="off"
					defaultValue={sentence}
					error={errorOf("sentence")}
				/>
				<div>
					<Button name="intent" value="refuse">
						Refuse it
					</Button>
				</div>
			</Form>
		</div>
	)
}
