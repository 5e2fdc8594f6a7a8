import { type Day, dayWords, monthDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { casesWords } from "~/domain/quantity"
import { discountWords, type EarlyDiscount } from "./discount-words"

type Missing = null | undefined

/** What has been settled of an invoice, by the way it was settled, in cents. */
export type Settled = {
	totalCents: number
	paidCents: number
	creditedCents?: number
	discountTakenCents?: number
	writtenOffCents?: number
}

/** What an invoice says about itself; page, PDF and letter put it into words here, so that they say the same. */
export type InvoiceFacts = Settled & {
	number: string
	store: { name: string; contactName?: string | Missing; address?: string | Missing }
	order?: { number: string; placedOn: Day } | Missing
	orders?: readonly { number: string; placedOn: Day; deliveredOn: Day; poNumber?: string | Missing }[]
	poNumbers?: string | Missing
	delivered?:
		| {
				from?: Day | Missing
				on: Day
				at?: string | Missing
				place?: string | Missing
				netWeight?: string | Missing
				signedBy?: string | Missing
		  }
		| Missing
	due: { on: Day; termsWords: string }
	discount?: EarlyDiscount | Missing
	waysToPay: string
	lines: readonly { casesSent: number }[]
}

/** What has been settled so far, each way on a line of its own, as it is taken off the total. */
export function settledParts(invoice: Settled): { label: string; cents: number }[] {
	const { paidCents, creditedCents = 0, discountTakenCents = 0, writtenOffCents = 0 } = invoice
	return [
		{ label: "Credited", cents: -creditedCents },
		{ label: "Discount for paying early", cents: -discountTakenCents },
		{ label: "Paid, thank you", cents: -paidCents },
		{ label: "Written off", cents: -writtenOffCents },
	].filter(({ cents }) => cents < 0)
}

/** What is still to be paid in cents, never below zero. */
export function openCents(invoice: Settled): number {
	return Math.max(
		0,
		settledParts(invoice).reduce((open, part) => open + part.cents, invoice.totalCents),
	)
}

/** A group of facts at the head of an invoice: the name is set large, the facts below it in lines. */
export type Party = { group: string; name: string; facts: string[] }

/** To whom, what was delivered, by when to pay: the groups at the head of an invoice, in their order. */
export function invoiceParties(invoice: InvoiceFacts): Party[] {
	return [toStore(invoice), ...deliveredParty(invoice), toPay(invoice)]
}

const known = (facts: readonly (string | Missing | false)[]) => facts.filter((fact): fact is string => Boolean(fact))

function toStore({ store, order, orders = [], poNumbers }: InvoiceFacts): Party {
	const ordered =
		orders.length > 1 ? `Your ${orders.length} orders` : order && `Your order of ${monthDay(order.placedOn)}`
	return {
		group: "To",
		name: store.name,
		// Of several orders each has its number beside it.
		facts: known([
			store.contactName,
			store.address,
			ordered,
			orders.length < 2 && poNumbers && `Your number: ${poNumbers}`,
		]),
	}
}

function deliveredParty({ delivered, lines, orders = [] }: InvoiceFacts): Party[] {
	if (!delivered) return []
	const cases = casesWords(lines.reduce((sum, line) => sum + line.casesSent, 0))
	const isSpan = delivered.from && delivered.from !== delivered.on
	return [
		{
			group: "Delivered",
			name:
				isSpan && delivered.from ? `${monthDay(delivered.from)} to ${monthDay(delivered.on)}` : dayWords(delivered.on),
			facts: known([
				known([delivered.at, delivered.place, orders.length > 1 && `${orders.length} orders`, cases]).join(", "),
				delivered.netWeight && `${delivered.netWeight} of comb, net`,
				delivered.signedBy && `Signed for by ${delivered.signedBy}`,
			]),
		},
	]
}

function toPay(invoice: InvoiceFacts): Party {
	const { due, discount, waysToPay, number } = invoice
	if (openCents(invoice) === 0) {
		const isPaid = invoice.paidCents === invoice.totalCents
		return { group: "To pay", name: "Nothing", facts: [`This invoice is ${isPaid ? "paid" : "settled"}.`] }
	}
	return {
		group: "Please pay by",
		name: dayWords(due.on),
		facts: known([due.termsWords, discount && discountWords(discount), waysToPay, `Quote ${number}`]),
	}
}

/** What stands on the tear-off that goes back with a check; null when nothing is open. */
export function invoiceSlip(invoice: InvoiceFacts): { head: string; value: string; grow?: number }[] | null {
	const open = openCents(invoice)
	if (open === 0) return null
	const { number, store, due, discount } = invoice
	return [
		{ head: "Invoice", value: number },
		{ head: "Store", value: store.name, grow: 1.8 },
		...(discount ? [{ head: `By ${monthDay(discount.untilOn)}`, value: formatMoney(open - discount.cents) }] : []),
		{ head: `By ${monthDay(due.on)}`, value: formatMoney(open) },
	]
}

/**
 * Lines under the order that each fills, in the order of the lines, with words above them where there are several orders:
 * "Order 318, delivered Tuesday, August 18, your number 4471". One group without words where there is one.
 */
export function linesByOrder<Line extends { orderNumber?: string | Missing }>(
	lines: readonly Line[],
	orders: InvoiceFacts["orders"] = [],
): { head: string | null; lines: Line[] }[] {
	if (orders.length < 2) return [{ head: null, lines: [...lines] }]
	const groups = orders
		.map((order) => ({
			head: known([
				`Order ${order.number}`,
				`delivered ${dayWords(order.deliveredOn)}`,
				order.poNumber && `your number ${order.poNumber}`,
			]).join(", "),
			lines: lines.filter((line) => line.orderNumber === order.number),
		}))
		.filter((group) => group.lines.length > 0)
	const numbers = new Set(orders.map((order) => order.number))
	const others = lines.filter((line) => !line.orderNumber || !numbers.has(line.orderNumber))
	return others.length > 0 ? [...groups, { head: null, lines: others }] : groups
}
