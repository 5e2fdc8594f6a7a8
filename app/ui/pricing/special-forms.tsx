import type { ReactNode } from "react"
import { Form } from "react-router"
import { Button } from "~/ui/forms/button"
import { SelectField, TextField } from "~/ui/forms/fields"

type Field = (name: string, otherwise?: string) => { name: string; defaultValue: string; error: string | undefined }
type Choice = { id: string; name: string }
type Product = Choice & { code: string; pricedBy: "case" | "weight" }

const choices = (list: readonly Choice[]) => list.map(({ id, name }) => ({ value: id, label: name }))
const productChoices = (list: readonly Product[]) =>
	list.map(({ id, code, name, pricedBy }) => ({
		value: id,
		label: `${code} ${name}${pricedBy === "weight" ? ", by weight" : ""}`,
	}))

function OneForm({ intent, press, children }: { intent: string; press: string; children: ReactNode }) {
	return (
		<Form method="post" className="sheet-form in-line" noValidate>
			{children}
			<div>
				<Button name="intent" value={intent}>
					{press}
				</Button>
			</div>
		</Form>
	)
}

/** A price for one store alone. */
export function OwnPriceForm(props: {
	field: Field
	stores: readonly Choice[]
	products: readonly Product[]
	today: string
}) {
	const { field, stores, products, today } = props
	if (stores.length === 0 || products.length === 0) return null
	return (
		<OneForm intent="own" press="Set this store’s price">
			<SelectField {...field("own-store")} label="Store" options={choices(stores)} />
			<SelectField {...field("own-product")} label="Product" options={productChoices(products)} />
			<TextField {...field("own-min", "1")} label="From how many cases" inputMode="numeric" autoComplete="off" />
			<TextField
				{...field("own-price")}
				label="A case in dollars, or a pound by weight"
				inputMode="decimal"
				autoComplete="off"
			/>
			<TextField {...field("own-from", today)} label="From day" type="date" min={today} />
			<TextField {...field("own-until")} label="Last day, if there is one" type="date" min={today} />
		</OneForm>
	)
}

/** So much off a product between two days. */
export function PromotionForm(props: {
	field: Field
	tiers: readonly Choice[]
	products: readonly Product[]
	today: string
}) {
	const { field, tiers, products, today } = props
	if (products.length === 0) return null
	return (
		<OneForm intent="promotion" press="Add this promotion">
			<TextField {...field("off-name")} label="Name" autoComplete="off" maxLength={80} />
			<SelectField {...field("off-product")} label="Product of the promotion" options={productChoices(products)} />
			<SelectField
				{...field("off-tier")}
				label="Tier of the promotion"
				options={[{ value: "", label: "every tier" }, ...choices(tiers)]}
			/>
			<TextField {...field("off-share")} label="Percent off" inputMode="decimal" autoComplete="off" />
			<TextField {...field("off-from", today)} label="First day" type="date" min={today} />
			<TextField {...field("off-until")} label="Last day" type="date" min={today} />
		</OneForm>
	)
}

/** Gives a store another tier. */
export function StoreTierForm(props: {
	field: Field
	stores: readonly (Choice & { tierId: string })[]
	tiers: readonly Choice[]
}) {
	const { field, stores, tiers } = props
	if (stores.length === 0) return null
	const nameOf = (tierId: string) => tiers.find(({ id }) => id === tierId)?.name
	return (
		<section aria-labelledby="store-tier">
			<div className="sheet-part">
				<h2 className="head-italic" id="store-tier">
					A store’s tier
				</h2>
				<p>Another tier holds from the store’s next order on. Orders that are placed keep their prices.</p>
			</div>
			<OneForm intent="tier" press="Change the tier">
				<SelectField
					{...field("tier-store")}
					label="Store, with its tier now"
					options={stores.map(({ id, name, tierId }) => ({ value: id, label: `${name}: ${nameOf(tierId)}` }))}
				/>
				<SelectField {...field("tier-tier")} label="Its tier from now on" options={choices(tiers)} />
			</OneForm>
		</section>
	)
}
