import { CheckField, SelectField, TextField } from "~/ui/forms/fields"

/** What a field of the form begins with, what is wrong with it, and what is to be said of it. */
export type FieldOf = (name: string) => { name: string; defaultValue: string; error?: string; hint?: string }

type Choices = { tiers: readonly { id: string; name: string }[]; taxPlaces: readonly string[] }

/** All that the producer sets of a store: who it is, its prices, its terms, its credit. */
export function StoreTermsFields({ field, choices, isNew }: { field: FieldOf; choices: Choices; isNew: boolean }) {
	return (
		<div className="store-fields">
			<TextField label="Name" autoComplete="off" {...field("name")} />
			<TextField label="Address" autoComplete="off" {...field("address")} />
			<TextField label="Where and until when goods are taken in" autoComplete="off" {...field("receivingNote")} />
			<TextField label="Telephone" type="tel" autoComplete="off" {...field("phone")} />
			<TextField label="E-mail" type="email" autoComplete="off" spellCheck={false} {...field("email")} />
			<SelectField
				label="Price tier"
				options={[
					...(isNew ? [{ value: "", label: "Choose" }] : []),
					...choices.tiers.map(({ id, name }) => ({ value: id, label: name })),
				]}
				{...field("tierId")}
			/>
			<SelectField
				label="Invoices fall due"
				options={[
					{ value: "on-receipt", label: "on receipt" },
					{ value: "net", label: "so many days after the invoice" },
					{ value: "end-of-month", label: "so many days after the month ends" },
				]}
				{...field("termsKind")}
			/>
			<TextField label="Days" inputMode="numeric" autoComplete="off" {...field("termsDays")} />
			<SelectField
				label="Invoiced"
				options={[
					{ value: "each-order", label: "each order by itself" },
					{ value: "month-end", label: "all orders of a month together" },
				]}
				{...field("invoicing")}
			/>
			<TextField
				label="Discount for paying early, %"
				inputMode="decimal"
				autoComplete="off"
				{...withHint(field("discount"), "0 for none.")}
			/>
			<TextField label="If paid within days" inputMode="numeric" autoComplete="off" {...field("discountDays")} />
			<SelectField
				label="Place of the sales tax"
				options={[
					{ value: "", label: "your own rate" },
					...placesWith(choices.taxPlaces, field("taxPlace").defaultValue).map((place) => ({
						value: place,
						label: place,
					})),
				]}
				{...withHint(field("taxPlace"), "Local rules decide which rate applies.")}
			/>
			<TextField label="Least for a delivery, $" inputMode="decimal" autoComplete="off" {...field("minimum")} />
			<TextField label="Delivery, $" inputMode="decimal" autoComplete="off" {...field("deliveryCharge")} />
			<TextField
				label="Delivery is free from, $"
				inputMode="decimal"
				autoComplete="off"
				{...withHint(field("freeAbove"), "Empty for never.")}
			/>
			<TextField
				label="Credit limit, $"
				inputMode="decimal"
				autoComplete="off"
				{...withHint(field("creditLimit"), "Empty for none. You are told of orders above it and decide.")}
			/>
			<div className="grid gap-3">
				<Tick label="Look at every order first (stopped)" field={field("isStopped")} />
				<Tick label="Hold reminders" field={field("remindersHeld")} />
				<Tick label="Buys from us" field={field("isActive")} />
			</div>
		</div>
	)
}

/** A place that has left the tax table stays to be chosen as long as the store has it. */
function placesWith(places: readonly string[], chosen: string): string[] {
	return chosen === "" || places.includes(chosen) ? [...places] : [...places, chosen]
}

function withHint(field: ReturnType<FieldOf>, hint: string): ReturnType<FieldOf> {
	return { ...field, hint: field.hint ? `${hint} ${field.hint}` : hint }
}

function Tick({ label, field }: { label: string; field: ReturnType<FieldOf> }) {
	const { defaultValue, ...rest } = field
	return <CheckField label={label} {...rest} value="yes" defaultChecked={defaultValue === "yes"} />
}
