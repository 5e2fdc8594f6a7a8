import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { findWithdrawalPlan } from "~/services/withdrawals/find-withdrawal-plan.server"
import { startWithdrawal } from "~/services/withdrawals/start-withdrawal.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { FieldError } from "~/ui/forms/field-error"
import { SheetHead } from "~/ui/layout/sheet"
import { WithdrawalReach } from "~/ui/trace/withdrawal-reach"
import { WordsField } from "~/ui/trace/words-field"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/withdrawal-new"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { withdrawalForm } from "./withdrawal-form"

export const meta: Route.MetaFunction = () => [{ title: "Withdraw a lot · Waxbill" }]

/** The plan for the lot that the address names; 404 where there is none. Without a lot, one is chosen first. */
async function planOf({ producer }: DeskScope, url: URL) {
	const code = url.searchParams.get("lot")
	if (!code) throw redirect(`/desk/${producer.slug}/lots`)
	const plan = await findWithdrawalPlan({ producerId: producer.id, code })
	if (!plan) throw data(null, { status: 404 })
	return { code, plan }
}

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { code, plan } = await planOf(scope, url)
	return { frame: await findDeskFrame(scope, { part: "lots" }), code, plan, idempotencyKey: randomUUID() }
})

export const action = guard(admits.desk("owner", "desk"), async ({ request }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const typed = {
		codes: form.getAll("codes").map(String),
		...Object.fromEntries(
			["reason", "instructions", "idempotencyKey"].map((name) => [name, String(form.get(name) ?? "")]),
		),
	} as { codes: string[]; reason: string; instructions: string; idempotencyKey: string }
	const refuse = (status: number, ...errors: { field?: string; message: string }[]) =>
		data({ errors, typed }, { status })
	const parsed = withdrawalForm.safeParse(typed)
	if (!parsed.success) {
		const errors = parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message }))
		if (errors.some(({ field }) => field === "idempotencyKey")) throw data(null, { status: 400 })
		return refuse(422, ...errors)
	}
	const { producer, person } = scope
	const started = await startWithdrawal({ producer, personId: person.id, ...parsed.data })
	if (started.ok) throw redirect(`/desk/${producer.slug}/withdrawals/${started.number}?begun=1`)
	if (started.reason === "no-such-lot")
		return refuse(422, { field: "codes", message: `There is no lot ${started.code}.` })
	return refuse(409, {
		field: "codes",
		message: `Withdrawn already: ${started.codes.join(", ")}. Take it off the list.`,
	})
})

/** Calling a lot back, with all that was made from it: why, and what to do. */
export default function NewWithdrawal({ loaderData, actionData, params }: Route.ComponentProps) {
	const { code, plan, idempotencyKey } = loaderData
	const errors = actionData?.errors ?? []
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	const isChosen = (one: string) => (actionData ? actionData.typed.codes.includes(one) : true)
	if (plan.isWithdrawn) {
		return (
			<DeskBook frame={loaderData.frame}>
				<SheetHead
					title={`Lot ${code} is withdrawn already`}
					lead={<Link to={`/desk/${params.producer}/withdrawals`}>All withdrawals</Link>}
				/>
			</DeskBook>
		)
	}
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead
				title={`Withdraw lot ${code}`}
				lead="What is left of it is held from this moment, and every store that was sent pieces is written to."
				note="A withdrawn lot stays withdrawn: there is no undo, and the letters go at once."
			/>
			<ErrorSummary title="Nothing was withdrawn" errors={errors} />
			<Form method="post" className="sheet-form" noValidate>
				<input type="hidden" name="idempotencyKey" value={actionData?.typed.idempotencyKey ?? idempotencyKey} />
				<fieldset id="field-codes" aria-describedby={errorOf("codes") ? "codes-error" : undefined}>
					<legend>Which lots</legend>
					{plan.lots.map((lot) => (
						<div className="check" key={lot.code}>
							<input
								type="checkbox"
								id={`lot-${lot.code}`}
								name="codes"
								value={lot.code}
								defaultChecked={isChosen(lot.code)}
							/>
							<div>
								<label htmlFor={`lot-${lot.code}`}>
									<b>{lot.code}</b>, {lot.productName}, {lot.detail}
								</label>
								<p className="note">
									{lot.inHand} pieces in hand, {lot.out} sold{lot.isAsked ? "" : "; made from this lot"}
								</p>
							</div>
						</div>
					))}
					{errorOf("codes") && <FieldError id="codes-error">{errorOf("codes")}</FieldError>}
				</fieldset>
				<WordsField
					name="reason"
					label="Why"
					hint="Stores read it in the letter, and the public on the page of the lot."
					maxLength={600}
					defaultValue={actionData?.typed.reason}
					error={errorOf("reason")}
				/>
				<WordsField
					name="instructions"
					label="What to do with the pieces"
					hint="Say what to do with pieces on the shelf, and with those that were sold on."
					maxLength={900}
					defaultValue={actionData?.typed.instructions}
					error={errorOf("instructions")}
				/>
				<div>
					<Button variant="primary" size="big" name="intent" value="withdraw">
						{plan.storeCount === 0
							? "Withdraw and hold what is left"
							: `Withdraw and write to ${plan.storeCount === 1 ? "one store" : `${plan.storeCount} stores`}`}
					</Button>
				</div>
			</Form>
			<WithdrawalReach packedOrders={plan.packedOrders} marketDays={plan.marketDays} />
			<section className="sheet-part" aria-labelledby="also-needed">
				<h2 className="head-italic" id="also-needed">
					What else may be needed
				</h2>
				{plan.storeCount > 0 && (
					<p>{plan.storePieces} pieces went to stores, counting every lot above, whether it is chosen or not.</p>
				)}
				<p>
					Food that may hurt someone may have to be reported to the authority at once. Ask yours; this page informs no
					authority.
				</p>
			</section>
		</DeskBook>
	)
}
