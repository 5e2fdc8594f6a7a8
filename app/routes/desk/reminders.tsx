import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"
import { stepWords } from "~/domain/receivables/reminders"
import { findRemindersPage } from "~/services/receivables/find-reminders-page.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { NewReminderStep, ReminderStep, type TypedStep } from "~/ui/receivables/reminder-steps"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/reminders"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { takeRemindersStep } from "./reminders-step.server"

export const meta: Route.MetaFunction = () => [{ title: "Reminders · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, roles } = scope
	const page = await findRemindersPage({ producerId: producer.id })
	return {
		frame: await findDeskFrame(scope, { part: "invoices" }),
		...page,
		sent: page.sent.map(({ at, ...one }) => ({ ...one, on: dayInZone(at, producer.timeZone) })),
		yardName: producer.name,
		isOwner: roles.includes("owner"),
		newStepId: randomUUID(),
		done: url.searchParams.has("done"),
	}
})

export const action = guard(admits.desk("owner"), async ({ request, url }: Route.ActionArgs, scope) => {
	const step = await takeRemindersStep(await request.formData(), scope)
	if (!step.ok) return data(step.answer, { status: step.status })
	throw redirect(`${url.pathname}?done`)
})

export default function Reminders({ loaderData, actionData, params }: Route.ComponentProps) {
	const { remindersOn, steps, held, sent, yardName, isOwner, done } = loaderData
	const base = `/desk/${params.producer}`
	const errors = actionData?.errors ?? []
	const stepId = actionData?.typed.stepId ?? ""
	const typedOf = (id: string): TypedStep | null => (stepId === id && actionData ? actionData : null)
	return (
		<DeskBook frame={loaderData.frame}>
			{done && !actionData && <MessageLine tone="saved" title="Kept." />}
			<SheetHead
				title="Reminders"
				lead={
					remindersOn
						? "Written by themselves each morning: one letter to a store for each step, naming all invoices that have reached it."
						: "Reminders are off: nothing is written by itself."
				}
				action={<Link to={`${base}/receivables`}>Who owes what</Link>}
			/>
			<ErrorSummary errors={errors} idOf={(field) => (stepId ? `field-${field}-${stepId}` : `field-${field}`)} />
			{isOwner && (
				<Form method="post" className="px-4 pb-4 desk:px-8" aria-label="Reminders on or off">
					<Button name="intent" value={remindersOn ? "off" : "on"}>
						{remindersOn ? "Turn reminders off" : "Turn reminders on"}
					</Button>
				</Form>
			)}
			{steps.length === 0 && (
				<EmptyLine
					action={
						isOwner && (
							<Form method="post">
								<Button variant="primary" name="intent" value="first-steps">
									Begin with three steps
								</Button>
							</Form>
						)
					}
				>
					There is no step yet, so nothing is written. Three can be a beginning: three days before, a week after, three
					weeks after. Their words are yours to change.
				</EmptyLine>
			)}
			{steps.map((step) => (
				<ReminderStep
					key={`${step.id} ${typedOf(step.id) ? "typed" : ""}`}
					step={step}
					typed={typedOf(step.id)}
					yardName={yardName}
					isEditable={isOwner}
				/>
			))}
			{isOwner && (
				<NewReminderStep
					id={actionData && stepId && !steps.some(({ id }) => id === stepId) ? stepId : loaderData.newStepId}
					typed={stepId && !steps.some(({ id }) => id === stepId) ? typedOf(stepId) : null}
				/>
			)}
			<section className="store-part" aria-labelledby="held-head">
				<h2 className="head-italic" id="held-head">
					Held
				</h2>
				<p>
					{held.length === 0
						? "No store is on hold. Reminders are held on the store’s own page."
						: "Nothing is written to "}
					{held.map(({ slug, name }, index) => (
						<span key={slug}>
							{index > 0 && ", "}
							<Link to={`${base}/stores/${slug}`}>{name}</Link>
						</span>
					))}
					{held.length > 0 && "."}
				</p>
			</section>
			<section className="store-part" aria-labelledby="sent-head">
				<h2 className="head-italic" id="sent-head">
					Last written
				</h2>
				{sent.length === 0 && <p>Nothing yet.</p>}
				<ul>
					{sent.map((one) => (
						<li key={`${one.storeSlug} ${one.on} ${one.daysAfterDue}`}>
							{fullDay(one.on)}: <Link to={`${base}/stores/${one.storeSlug}`}>{one.storeName}</Link>,{" "}
							{one.invoices === 1 ? "one invoice" : `${one.invoices} invoices`} {stepWords(one.daysAfterDue)}
						</li>
					))}
				</ul>
			</section>
			{isOwner && <FinanceCharge loaderData={loaderData} actionData={actionData} />}
		</DeskBook>
	)
}

function FinanceCharge({ loaderData, actionData }: Pick<Route.ComponentProps, "loaderData" | "actionData">) {
	const mine = actionData?.intent === "finance" ? actionData : null
	const rate = plainMoney(loaderData.financeChargeBasisPoints).replace(/\.?0+$/, "") || "0"
	const field = (name: string, begin: string) => ({
		name,
		defaultValue: mine?.typed[name] ?? begin,
		error: mine?.errors.find((error) => error.field === name)?.message,
	})
	return (
		<section className="store-part" aria-labelledby="finance-head">
			<h2 className="head-italic" id="finance-head">
				Charge for paying late
			</h2>
			<p className="max-w-[46rem] pb-3">
				On the first of each month a store can be invoiced a part of what it has had overdue. Law limits such charges,
				and often asks that they were agreed in writing before: ask whoever advises you before you set one. Charges are
				never charged on.
			</p>
			<Form method="post" noValidate className="store-fields" aria-label="Charge for paying late">
				<input type="hidden" name="intent" value="finance" />
				<TextField
					label="A month, % of what is overdue"
					inputMode="decimal"
					autoComplete="off"
					hint="0 for none."
					{...field("rate", rate)}
				/>
				<TextField
					label="Only what is late by more than days"
					inputMode="numeric"
					autoComplete="off"
					{...field("afterDays", String(loaderData.financeChargeAfterDays))}
				/>
				<div>
					<Button>Set the charge</Button>
				</div>
			</Form>
		</section>
	)
}
