import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { type Weekday, weekdayName } from "~/domain/calendar"
import { invitePerson } from "~/services/people/invite-person.server"
import { addStore, findStoreChoices } from "~/services/receivables/add-store.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { SheetHead } from "~/ui/layout/sheet"
import { type FieldOf, StoreTermsFields } from "~/ui/receivables/store-terms-fields"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/store-new"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { NEW_STORE, typedFields } from "./store-form"
import { readNewStore } from "./store-new-form"

export const meta: Route.MetaFunction = () => [{ title: "A new store · Waxbill" }]

export const loader = guard(admits.desk("owner"), async (_args: Route.LoaderArgs, scope) => ({
	frame: await findDeskFrame(scope, { part: "stores" }),
	choices: await findStoreChoices({ producerId: scope.producer.id }),
	storeId: randomUUID(),
}))

const FAULTS = {
	"slug-taken": { field: "slug", message: "Another store has that name in addresses. Write another." },
	"no-such-tier": { field: "tierId", message: "Choose a price tier of the list." },
	"no-such-round": { field: "rounds", message: "Choose rounds of the list." },
} as const

export const action = guard(admits.desk("owner"), async ({ request }: Route.ActionArgs, scope) => {
	const { producer, person } = scope
	const typed = typedFields(await request.formData())
	const read = readNewStore(typed)
	if (!read.ok) return data({ errors: read.errors, typed }, { status: 422 })
	const { buyer, ...store } = read.store
	const added = await addStore({ producerId: producer.id, personId: person.id, ...store })
	if (!added.ok) return data({ errors: [FAULTS[added.reason]], typed }, { status: 422 })
	const page = `/desk/${producer.slug}/stores/${store.slug}`
	if (!buyer) throw redirect(`${page}?done=added`)
	const invited = await invitePerson(producer, person, { ...buyer, role: "buyer", storeId: store.storeId })
	throw redirect(`${page}?done=${invited.ok ? "added" : "added-uninvited"}`)
})

export default function StoreNew({ loaderData, actionData, params }: Route.ComponentProps) {
	const { choices, storeId } = loaderData
	const typed = actionData?.typed ?? NEW_STORE
	const errors: readonly { field: string; message: string }[] = actionData?.errors ?? []
	const errorOf = (name: string) => errors.find((error) => error.field === name)?.message
	const field: FieldOf = (name) => ({ name, defaultValue: typed[name] ?? "", error: errorOf(name) })
	const rounds = (typed.rounds ?? "").split(",")
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="A new store"
				lead="Who buys by the case from you, at which prices and on which terms."
				action={<Link to={`/desk/${params.producer}/stores`}>Stores</Link>}
			/>
			<ErrorSummary title="The store was not added" errors={errors} />
			<Form method="post" noValidate aria-label="A new store">
				<input type="hidden" name="storeId" value={actionData?.typed.storeId ?? storeId} />
				<div className="store-part">
					<StoreTermsFields field={field} choices={choices} isNew />
				</div>
				<div className="store-part store-fields">
					<TextField
						label="Name in addresses"
						autoComplete="off"
						spellCheck={false}
						hint="Empty to make it from the name. It stays."
						{...field("slug")}
					/>
					<fieldset className="field" id="field-rounds">
						<legend className="field-label">Delivered on</legend>
						{choices.rounds.length === 0 && <span className="field-hint">There is no round yet.</span>}
						{choices.rounds.map(({ id, name, weekday }) => (
							<label className="check" key={id}>
								<input type="checkbox" name="rounds" value={id} defaultChecked={rounds.includes(id)} />
								<span>
									{weekdayName(weekday as Weekday)}, {name}
								</span>
							</label>
						))}
						{errorOf("rounds") && <span className="field-error">{errorOf("rounds")}</span>}
					</fieldset>
				</div>
				<div className="store-part">
					<h2 className="head-italic">Who will order</h2>
					<div className="store-fields">
						<TextField
							label="Buyer’s name"
							autoComplete="off"
							hint="Empty to invite nobody yet."
							{...field("buyerName")}
						/>
						<TextField
							label="Buyer’s e-mail"
							type="email"
							autoComplete="off"
							spellCheck={false}
							{...field("buyerEmail")}
						/>
					</div>
					<div className="mt-4">
						<Button variant="primary" size="big">
							Add the store
						</Button>
					</div>
				</div>
			</Form>
		</DeskBook>
	)
}
