/** Fields that carry no words of the person: what the form is for, and keys that keep it from counting twice. */
const UNSEEN = /^(intent|formKey|idempotencyKey|onceKey)$/i
const UUID = /[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}/gi

/** A form may say what a field is called where its name cannot: `label-<name>` beside the field. */
const LABEL = "label-"

/**
 * Posted fields as a person knows them, in their order: under the form's own label where it gave one, else `deliveryOn`
 * is shown as "Delivery on". Ids and empty fields are left out. For showing only; what is sent again is all of them, as
 * they were.
 */
export function plainFields(fields: readonly (readonly [string, string])[]): { label: string; value: string }[] {
	const labels = new Map(
		fields.flatMap(([name, value]) => (name.startsWith(LABEL) ? [[name.slice(LABEL.length), value] as const] : [])),
	)
	return fields
		.filter(([name, value]) => value.trim() !== "" && !UNSEEN.test(name) && !name.startsWith(LABEL))
		.filter(([, value]) => value.replace(UUID, "") !== "")
		.map(([name, value]) => ({ label: labels.get(name) ?? plainName(name), value }))
}

function plainName(name: string): string {
	const words = name
		.replace(UUID, " ")
		.replace(/([a-z])([A-Z])/g, "$1 $2")
		.replace(/[^A-Za-z0-9]+/g, " ")
		.trim()
		.toLowerCase()
	return words === "" ? "Typed" : words.charAt(0).toUpperCase() + words.slice(1)
}
