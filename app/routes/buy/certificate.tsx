import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { listCertificates } from "~/services/certificates/list-certificates.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { CertificateRows } from "~/ui/receivables/certificate-rows"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/certificate"
import { BuyBook } from "./buy-book"
import { takeCertificate } from "./certificate-upload.server"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Resale certificate · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const now = askClock()
	const zone = producer.timeZone
	const { validUntil, certificates } = await listCertificates({ producerId: producer.id, storeId: store.id })
	return {
		frame: await findBuyFrame(scope, { part: "details", now }),
		producerName: producer.name,
		validUntil,
		today: dayInZone(now, zone),
		certificates: certificates.map(({ handedInAt, ...one }) => ({ ...one, handedInOn: dayInZone(handedInAt, zone) })),
		certificateId: randomUUID(),
		isHandedIn: url.searchParams.has("handed-in"),
	}
})

export const action = guard(admits.store("buyer", "payer"), async ({ request, url }: Route.ActionArgs, scope) => {
	const taken = await takeCertificate(request, scope)
	if (!taken.ok) return data({ errors: taken.errors, typed: taken.typed }, { status: taken.status })
	throw redirect(`${url.pathname}?handed-in`)
})

export default function Certificate({ loaderData, actionData, params }: Route.ComponentProps) {
	const { producerName, validUntil, certificates, certificateId, isHandedIn, today } = loaderData
	const errors: readonly { field?: string; message: string }[] = actionData?.errors ?? []
	const typed: Record<string, string> = actionData?.typed ?? {}
	const field = (name: string) => ({
		name,
		defaultValue: typed[name] ?? "",
		error: errors.find((error) => error.field === name)?.message,
	})
	const { defaultValue: _, ...file } = field("file")
	return (
		<BuyBook frame={loaderData.frame}>
			{isHandedIn && !actionData && (
				<MessageLine tone="saved" title="The certificate is handed in.">
					{producerName} looks at it and writes to you.
				</MessageLine>
			)}
			<SheetHead
				title="Resale certificate"
				lead={standingWords(validUntil, today)}
				action={<Link to={`/buy/${params.producer}/${params.store}/details`}>Our details</Link>}
			/>
			<ErrorSummary title="The certificate was not handed in" errors={errors} />
			<section className="store-part" aria-labelledby="hand-in-head">
				<h2 className="head-italic" id="hand-in-head">
					Hand in a certificate
				</h2>
				<Form
					method="post"
					encType="multipart/form-data"
					noValidate
					className="grid gap-4"
					aria-label="Hand in a certificate"
				>
					<input type="hidden" name="certificateId" value={certificateId} />
					<TextField label="Its number" autoComplete="off" {...field("number")} />
					<TextField label="The last day it is good" type="date" {...field("validUntil")} />
					{/* The file comes last: what stands before it is read first. */}
					<TextField
						label="The certificate"
						type="file"
						accept="application/pdf,image/jpeg,image/png,image/webp"
						hint="A PDF or a photo (JPEG, PNG or WebP), up to 10 MB."
						{...file}
					/>
					<div>
						<Button variant="primary">Hand it in</Button>
					</div>
				</Form>
				<p className="note max-w-[46rem] pt-4">
					Local rules decide what is taxed and which certificate counts; {producerName} decides whether this one is
					taken.
				</p>
			</section>
			{certificates.length > 0 && <CertificateRows certificates={certificates} today={today} />}
		</BuyBook>
	)
}

function standingWords(validUntil: string | null, today: string): string {
	if (!validUntil) return "None is on file: invoices bear sales tax where it applies."
	if (validUntil < today) return `Yours ran out on ${fullDay(validUntil)}: invoices bear sales tax where it applies.`
	return `Yours is on file and good until ${fullDay(validUntil)}: what you buy for resale bears no sales tax.`
}
