import { Form } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"
import type { FieldOf } from "./store-terms-fields"

type Promised = {
	id: string
	amountCents: number
	promisedOn: Day
	note: string
	state: "open" | "kept" | "broken"
	notedBy: string
}

/** What the store has said it will pay: each promise with whether it was kept, and a form for the next. */
export function StorePromises({
	promises,
	today,
	promiseId,
	field,
}: {
	promises: readonly Promised[]
	today: Day
	promiseId: string
	field: FieldOf
}) {
	return (
		<section className="store-part" aria-labelledby="promises-head">
			<h2 className="head-italic" id="promises-head">
				Promises to pay
			</h2>
			{promises.length > 0 && (
				<ul className="promise-rows mb-4">
					{promises.map((promise) => (
						<li key={promise.id}>
							<span>
								<b className="fig">{formatMoney(promise.amountCents)}</b> by {fullDay(promise.promisedOn)}
								<PromiseState promise={promise} today={today} />
								<span className="note block">
									{promise.note && `${promise.note} `}Noted by {promise.notedBy}.
								</span>
							</span>
							{promise.state === "open" && (
								<Form method="post" preventScrollReset>
									<input type="hidden" name="intent" value="judge" />
									<input type="hidden" name="promiseId" value={promise.id} />
									<Button size="small" name="state" value="kept">
										Kept
									</Button>
									<Button size="small" name="state" value="broken">
										Broken
									</Button>
								</Form>
							)}
						</li>
					))}
				</ul>
			)}
			<Form method="post" noValidate aria-label="Note a promise" className="store-fields" preventScrollReset>
				<input type="hidden" name="intent" value="promise" />
				<input type="hidden" name="promiseId" value={promiseId} />
				<TextField label="How much they will pay, $" inputMode="decimal" autoComplete="off" {...field("amount")} />
				<TextField label="By which day" type="date" {...field("promisedOn")} />
				<TextField label="Who said so, and what" autoComplete="off" {...field("note")} />
				<div>
					<Button>Note the promise</Button>
				</div>
			</Form>
		</section>
	)
}

function PromiseState({ promise: { state, promisedOn }, today }: { promise: Promised; today: Day }) {
	if (state === "kept") return <>, kept</>
	if (state === "broken") return <span className="short">, broken</span>
	return promisedOn < today ? <span className="short">, its day has passed</span> : null
}
