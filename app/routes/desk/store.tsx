import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { termsWords } from "~/domain/invoicing/terms"
import { formatMoney } from "~/domain/money"
import { creditWarning } from "~/domain/receivables/credit-standing"
import { now as askClock } from "~/platform/clock.server"
import { findStoreChoices } from "~/services/receivables/add-store.server"
import { findStorePage } from "~/services/receivables/find-store-page.server"
import { findStoreBySlug } from "~/services/standing-orders/find-store-by-slug.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { StoreFacts, StoreOwed } from "~/ui/receivables/store-facts"
import { StorePromises } from "~/ui/receivables/store-promises"
import { type FieldOf, StoreTermsFields } from "~/ui/receivables/store-terms-fields"
import { WriteOffForm } from "~/ui/receivables/write-off-form"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/store"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { typedTerms } from "./store-form"
import { takeStoreStep } from "./store-step.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `${loaderData?.store.terms.name ?? "Store"} · Waxbill` },
]

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { producer, roles } = scope
	const now = askClock()
	const zone = producer.timeZone
	const today = dayInZone(now, zone)
	const store = await findStorePage({ producerId: producer.id, slug: params.store, today })
	if (!store) throw data(null, { status: 404 })
	const { agreedAt, ...ways } = store.waysToPay
	return {
		frame: await findDeskFrame(scope, { part: "stores", now }),
		store: {
			...store,
			waysToPay: { ...ways, agreedOn: agreedAt && dayInZone(agreedAt, zone) },
			reminders: store.reminders.map(({ at, ...one }) => ({ ...one, on: dayInZone(at, zone) })),
		},
		choices: await findStoreChoices({ producerId: producer.id }),
		isOwner: roles.includes("owner"),
		today,
		promiseId: randomUUID(),
		writeOffId: randomUUID(),
		done: url.searchParams.get("done"),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const store = await findStoreBySlug({ producerId: scope.producer.id, slug: params.store })
	if (!store) throw data(null, { status: 404 })
	const step = await takeStoreStep(await request.formData(), store, scope)
	if (!step.ok) return data(step.refused, { status: step.status })
	throw redirect(`${url.pathname}?done=${step.done}`)
})

const DONE: Record<string, string> = {
	added: "The store is there.",
	"added-uninvited": "The store is there. The buyer could not be invited: try it on the People page.",
	saved: "It holds from the next order and invoice on.",
	promise: "The promise is noted.",
	judged: "Noted.",
	"given-up": "The debt is given up.",
}

export default function Store({ loaderData, actionData, params }: Route.ComponentProps) {
	const { store, choices, isOwner, today, done } = loaderData
	const { terms } = store
	const base = `/desk/${params.producer}`
	const here = `${base}/stores/${params.store}`
	const errors = actionData?.errors ?? []
	const fieldsOf =
		(intent: string, begin: Record<string, string>): FieldOf =>
		(name) => {
			const mine = actionData?.intent === intent ? actionData : null
			const holds = mine?.holds?.typed[name]
			const value = mine ? (mine.typed[name] ?? "") : (begin[name] ?? "")
			return {
				name,
				defaultValue: value,
				error: mine?.errors.find((error) => error.field === name)?.message,
				...(holds !== undefined && holds !== value ? { hint: `It is now ${holds || "empty"}.` } : {}),
			}
		}
	const warning = creditWarning({ ...terms, owedCents: store.owed.owedCents - store.owed.onAccountCents }, 0)
	return (
		<DeskBook frame={loaderData.frame}>
			{done && DONE[done] && !actionData && <MessageLine tone="saved" title={DONE[done]} />}
			<SheetHead
				title={terms.name}
				lead={`${terms.address ? `${terms.address}. ` : ""}${store.tierName}, ${termsWords(terms.terms)}.`}
				action={
					<span className="flex flex-wrap gap-x-5">
						<Link className="py-1" to={`${here}/statement`}>
							Statement
						</Link>
						<Link className="py-1" to={`${here}/payment`}>
							Note a payment
						</Link>
						<Link className="py-1" to={`${here}/standing`}>
							Standing order
						</Link>
					</span>
				}
			/>
			<ErrorSummary title="Nothing was changed" errors={errors} />
			{warning && (
				<p className="margin-rule aside mx-4 mb-4 desk:mx-8">
					{warning.kind === "stopped"
						? "You look at every order of this store first, until you say otherwise below."
						: `It owes more than its limit of ${formatMoney(warning.limitCents)}: look at its orders first.`}
				</p>
			)}
			<StoreOwed
				owed={store.owed}
				invoices={store.openInvoices}
				today={today}
				base={base}
				statementHref={`${here}/statement`}
			/>
			<StorePromises
				promises={store.promises}
				today={today}
				promiseId={(actionData?.intent === "promise" && actionData.typed.promiseId) || loaderData.promiseId}
				field={fieldsOf("promise", {})}
			/>
			<StoreFacts facts={store} base={base} here={here} today={today} />
			{isOwner && (
				<section className="store-part" aria-labelledby="terms-head">
					<h2 className="head-italic" id="terms-head">
						What holds for this store
					</h2>
					<Form method="post" noValidate aria-label="What holds for this store" key={store.mark}>
						<input type="hidden" name="intent" value="save" />
						<input type="hidden" name="mark" value={actionData?.holds?.mark ?? store.mark} />
						<StoreTermsFields field={fieldsOf("save", typedTerms(terms))} choices={choices} isNew={false} />
						<div className="mt-4">
							<Button variant="primary">Save what holds for this store</Button>
						</div>
					</Form>
				</section>
			)}
			{isOwner && (
				<WriteOffForm
					invoices={store.openInvoices}
					givenUp={store.givenUp}
					writeOffId={(actionData?.intent === "write-off" && actionData.typed.writeOffId) || loaderData.writeOffId}
					field={fieldsOf("write-off", {})}
					isOpen={actionData?.intent === "write-off"}
				/>
			)}
		</DeskBook>
	)
}
