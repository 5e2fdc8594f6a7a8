import type Stripe from "stripe"
import { z } from "zod"
import { noSuch } from "./errors"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { page } from "./lists"
import { clearable, expandable, mergeMetadata, metadata, paging, paramsOf, readParams } from "./params"
import type { Endpoints } from "./router"

const addressSchema = z.strictObject({
	city: clearable.optional(),
	country: clearable.optional(),
	line1: clearable.optional(),
	line2: clearable.optional(),
	postal_code: clearable.optional(),
	state: clearable.optional(),
})

const fields = {
	...expandable,
	name: clearable.optional(),
	email: clearable.optional(),
	phone: clearable.optional(),
	description: clearable.optional(),
	address: addressSchema.optional(),
	metadata: metadata.optional(),
}
const writeSchema = paramsOf<Stripe.CustomerCreateParams & Stripe.CustomerUpdateParams>()(fields)
const listSchema = paramsOf<Stripe.CustomerListParams>()({ ...paging, email: z.string().optional() })

/** The customer named `id`; refuses with 404 `resource_missing`. */
export function getCustomer(fake: Fake, id: string, param?: string): Stripe.Customer {
	const customer = fake.store.customers.get(id)
	if (!customer) throw noSuch("customer", id, param)
	return customer
}

function write(customer: Stripe.Customer, given: z.infer<typeof writeSchema>): void {
	if (given.name !== undefined) customer.name = given.name
	if (given.email !== undefined) customer.email = given.email
	if (given.phone !== undefined) customer.phone = given.phone
	if (given.description !== undefined) customer.description = given.description
	if (given.address) {
		const none = { city: null, country: null, line1: null, line2: null, postal_code: null, state: null }
		customer.address = { ...none, ...customer.address, ...given.address }
	}
	customer.metadata = mergeMetadata(customer.metadata, given.metadata)
}

function blank(fake: Fake): Stripe.Customer {
	return {
		id: newId("cus", 14),
		object: "customer",
		address: null,
		balance: 0,
		created: fake.seconds(),
		currency: null,
		default_source: null,
		delinquent: false,
		description: null,
		discount: null,
		email: null,
		invoice_settings: { custom_fields: null, default_payment_method: null, footer: null, rendering_options: null },
		livemode: false,
		metadata: {},
		name: null,
		phone: null,
		preferred_locales: [],
		shipping: null,
		tax_exempt: "none",
		test_clock: null,
	}
}

export const customerEndpoints: Endpoints = {
	"POST /v1/customers": ({ fake, form, cause }) => {
		const customer = blank(fake)
		write(customer, readParams(writeSchema, form))
		fake.store.customers.set(customer.id, customer)
		fake.events.emit("customer.created", customer, cause)
		return customer
	},
	"GET /v1/customers": ({ fake, form }) => {
		const { email, ...rest } = readParams(listSchema, form)
		const rows = [...fake.store.customers.values()].filter((row) => email === undefined || row.email === email)
		return page(rows, "/v1/customers", rest)
	},
	"GET /v1/customers/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		return getCustomer(fake, id)
	},
	"POST /v1/customers/:id": ({ fake, form, id, cause }) => {
		const customer = getCustomer(fake, id)
		write(customer, readParams(writeSchema, form))
		fake.events.emit("customer.updated", customer, cause)
		return customer
	},
}
