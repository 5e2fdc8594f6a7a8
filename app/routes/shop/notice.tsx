import { data, Form, redirect } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import { clientNetwork } from "~/platform/client-network.server"
import { answerNotice, type NoticeRefusal } from "~/services/withdrawals/answer-notice.server"
import { findNotice } from "~/services/withdrawals/find-notice.server"
import { markOpened } from "~/services/withdrawals/mark-opened.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { MessageLine } from "~/ui/layout/sheet"
import { ShopFrame } from "~/ui/layout/shop-frame"
import { useOpened } from "~/ui/trace/use-opened"
import { WordsField } from "~/ui/trace/words-field"
import { waitWords } from "../auth/sign-in-fields"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/notice"
import { noticeForm } from "./notice-form"

export const meta: Route.MetaFunction = () => [
	{ title: "A lot is called back" },
	{ name: "robots", content: "noindex" },
]

/** Reading marks nothing: mail programs look behind links before a person does. */
export const loader = guard(admits.visitor, async ({ params, url }: Route.LoaderArgs, { producer }) => {
	const notice = await findNotice({ producerId: producer.id, token: params.token })
	const zone = producer.timeZone
	const shown = notice && {
		...notice,
		startedAt: fullDay(dayInZone(notice.startedAt, zone)),
		answeredAt: notice.answeredAt && fullDay(dayInZone(notice.answeredAt, zone)),
	}
	const answer = { yardName: producer.name, county: producer.county, slug: producer.slug, notice: shown }
	return data({ ...answer, isThanked: url.searchParams.has("thanks") }, { status: notice ? 200 : 410 })
})

export const action = guard(admits.visitor, async ({ request, params, url }: Route.ActionArgs, { producer }) => {
	const form = await request.formData()
	const query = { producerId: producer.id, token: params.token, network: clientNetwork(request) }
	if (form.get("intent") === "opened") {
		await markOpened(query)
		return null
	}
	const typed = { held: String(form.get("held") ?? ""), note: String(form.get("note") ?? "") }
	const parsed = noticeForm.safeParse(typed)
	if (!parsed.success) {
		const errors = parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message }))
		return data({ errors, typed }, { status: 422 })
	}
	const answered = await answerNotice({ ...query, heldPieces: parsed.data.held, note: parsed.data.note })
	if (answered.ok) throw redirect(`${url.pathname}?thanks=1`)
	return data({ errors: [refusalWords(answered)], typed }, { status: STATUS[answered.reason] })
})

const STATUS = { "no-such-notice": 410, "more-than-had": 422, "too-many": 429 } as const

function refusalWords(refusal: NoticeRefusal): { field?: string; message: string } {
	if (refusal.reason === "more-than-had")
		return { field: "held", message: `You were sent ${piecesWords(refusal.pieces)} of it; write no more than that.` }
	if (refusal.reason === "too-many")
		return {
			message: `Too many answers came from your network. You can answer again ${waitWords(refusal.retryAfterSeconds)}.`,
		}
	return { message: "This link is not known. Take the one in the letter." }
}

/** What a store reads behind the link in its letter, and where it answers. No sign-in. */
export default function Notice({ loaderData, actionData }: Route.ComponentProps) {
	const { yardName, county, slug, notice, isThanked } = loaderData
	useOpened(notice !== null)
	const errors = actionData?.errors ?? []
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	return (
		<ShopFrame
			yardName={yardName}
			place={county}
			homeHref={`/shop/${slug}`}
			nav={[]}
			foot={notice && <Contact yard={notice.yard} />}
		>
			<div className="shop-page">
				{notice === null ? (
					<>
						<h1 className="title">This link is not known</h1>
						<p className="shop-lead">Take the link in the letter as a whole, or write to the yard.</p>
					</>
				) : (
					<div className="max-w-[46rem]">
						{isThanked && !actionData && (
							<MessageLine tone="saved" title="Thank you, your answer is noted.">
								You can change it below.
							</MessageLine>
						)}
						<h1 className="title">Please stop selling {lotWords(notice.lots)}</h1>
						<p className="shop-lead">
							For {notice.storeName}. Withdrawn by {yardName} on {notice.startedAt}. {notice.reason}
						</p>
						<section className="call-back mt-4" aria-labelledby="what-to-do">
							<h2 className="name" id="what-to-do">
								What to do
							</h2>
							<p>{notice.instructions}</p>
						</section>
						<LotsHad lots={notice.lots} />
						<ErrorSummary title="Your answer was not taken" errors={errors} />
						<Form method="post" className="grid gap-4" noValidate>
							<TextField
								name="held"
								label={`How many of the ${piecesWords(notice.pieces)} do you still hold?`}
								hint="Count the shelf, the store room and the window. If none are left, write 0."
								inputMode="numeric"
								autoComplete="off"
								defaultValue={actionData?.typed.held ?? notice.heldPieces ?? ""}
								error={errorOf("held")}
							/>
							<WordsField
								name="note"
								label="Anything we should know"
								maxLength={600}
								defaultValue={actionData?.typed.note ?? notice.answerNote}
								error={errorOf("note")}
							/>
							<div>
								<Button variant="primary" size="big" name="intent" value="answer">
									{notice.answeredAt ? "Send the new answer" : "Send the answer"}
								</Button>
							</div>
						</Form>
					</div>
				)}
			</div>
		</ShopFrame>
	)
}

type Read = NonNullable<Route.ComponentProps["loaderData"]["notice"]>

const lotWords = (lots: Read["lots"]) =>
	lots.length === 1 ? `lot ${lots[0]?.code}` : `lots ${lots.map(({ code }) => code).join(", ")}`

function Contact({ yard: { address, phone, email } }: Pick<Read, "yard">) {
	return (
		<span>
			{[address, phone].filter(Boolean).join(". ")} <a href={`mailto:${email}`}>{email}</a>
		</span>
	)
}

function LotsHad({ lots }: Pick<Read, "lots">) {
	return (
		<table className="sheet-table notice-list">
			<caption className="head-italic pt-4 pb-1 text-left">What you were sent</caption>
			<thead>
				<tr>
					<th scope="col">Lot</th>
					<th scope="col">Product</th>
					<th scope="col" className="num">
						Pieces
					</th>
				</tr>
			</thead>
			<tbody>
				{lots.map((lot) => (
					<tr key={lot.code}>
						<td>
							<b>{lot.code}</b>
						</td>
						<td>
							{lot.productName}, {lot.detail}
						</td>
						<td className="num fig">{lot.pieces}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}
