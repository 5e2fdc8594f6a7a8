import type { Day } from "~/domain/calendar"
import { element, type Xml, xmlFile } from "./xml"

type Party = {
	name: string
	address: string | null
	contactName: string | null
	email: string | null
	phone: string | null
}

/** A line as it was issued. A line by weight has the price of a pound and its grams; a charge has no cases. */
export type UblLine = {
	code: string
	name: string
	detail: string
	lots: readonly string[]
	orderNumber: number | null
	cases: number
	caseCents: number
	poundCents: number | null
	netGrams: number
	lineCents: number
	taxCents: number
}

/** An invoice as it was issued; what has been paid since is no part of it. Money is cents, rates are basis points. */
export type UblInvoice = {
	number: string
	issuedOn: Day
	dueOn: Day
	notes: readonly string[]
	supplier: Party
	customer: Party
	orders: readonly { number: number; poNumber: string; deliveredOn: Day }[]
	termsWords: string
	discount: { basisPoints: number; untilOn: Day } | null
	lines: readonly UblLine[]
	linesCents: number
	deliveryCents: number
	taxCents: number
	totalCents: number
	taxBasisPoints: number
	taxPlace: string
	isForResale: boolean
}

const URN = "urn:oasis:names:specification:ubl:schema:xsd:"
const GRAMS_PER_POUND = "453.59237"
/** UNCL1001: commercial invoice. UNCL4461: means of payment not defined. From memory (high). */
const COMMERCIAL_INVOICE = "380"
const NO_MEANS_NAMED = "1"
/** UN/ECE Recommendations 20 and 21: a case, a gram, a unit. From memory (high). */
const UNIT = { case: "XCS", gram: "GRM", one: "C62" }

/**
 * Writes an invoice as a UBL 2.1 Invoice document in dollars. The same invoice gives the same file. Names and order of the
 * elements: OASIS, Universal Business Language 2.1, UBL-Invoice-2.1.xsd and UBL-CommonAggregateComponents-2.1.xsd. It
 * claims no customization and no profile: those are agreed between the parties.
 */
export function ublInvoice(invoice: UblInvoice): string {
	const [order] = invoice.orders
	return xmlFile(
		element(
			"Invoice",
			[
				element("cbc:UBLVersionID", "2.1"),
				element("cbc:ID", invoice.number),
				element("cbc:IssueDate", invoice.issuedOn),
				element("cbc:DueDate", invoice.dueOn),
				element("cbc:InvoiceTypeCode", COMMERCIAL_INVOICE),
				...invoice.notes.map((note) => element("cbc:Note", note)),
				element("cbc:DocumentCurrencyCode", "USD"),
				element("cbc:LineCountNumeric", String(invoice.lines.length)),
				invoice.orders.length === 1 && order ? orderReference(order) : null,
				element("cac:AccountingSupplierParty", [party(invoice.supplier)]),
				element("cac:AccountingCustomerParty", [party(invoice.customer)]),
				...[...new Set(invoice.orders.map(({ deliveredOn }) => deliveredOn))].map((day) =>
					element("cac:Delivery", [element("cbc:ActualDeliveryDate", day)]),
				),
				paymentMeans(invoice),
				paymentTerms(invoice),
				invoice.deliveryCents > 0 &&
					element("cac:AllowanceCharge", [
						element("cbc:ChargeIndicator", "true"),
						element("cbc:AllowanceChargeReason", "Delivery"),
						amount("cbc:Amount", invoice.deliveryCents),
					]),
				taxTotal(invoice),
				monetaryTotal(invoice),
				...invoice.lines.map((line, index) => invoiceLine(line, index + 1, invoice)),
			],
			{
				xmlns: `${URN}Invoice-2`,
				"xmlns:cac": `${URN}CommonAggregateComponents-2`,
				"xmlns:cbc": `${URN}CommonBasicComponents-2`,
			},
		),
	)
}

/** Cents as a decimal with a point and no separators: "929.90". */
function decimal(cents: number): string {
	const digits = String(Math.abs(cents)).padStart(3, "0")
	return `${cents < 0 ? "-" : ""}${digits.slice(0, -2)}.${digits.slice(-2)}`
}

const amount = (name: string, cents: number) => element(name, decimal(cents), { currencyID: "USD" })

/** The store's own number where it gave one, and ours beside it. */
function orderReference({ number, poNumber }: { number: number; poNumber: string }): Xml {
	return element("cac:OrderReference", [
		element("cbc:ID", poNumber || String(number)),
		element("cbc:SalesOrderID", String(number)),
	])
}

function party({ name, address, contactName, email, phone }: Party): Xml {
	const contact = [
		contactName ? element("cbc:Name", contactName) : null,
		phone ? element("cbc:Telephone", phone) : null,
		email ? element("cbc:ElectronicMail", email) : null,
	]
	return element("cac:Party", [
		element("cac:PartyName", [element("cbc:Name", name)]),
		address ? element("cac:PostalAddress", [element("cac:AddressLine", [element("cbc:Line", address)])]) : null,
		contact.some(Boolean) && element("cac:Contact", contact),
	])
}

function paymentMeans({ dueOn, number }: UblInvoice): Xml {
	return element("cac:PaymentMeans", [
		element("cbc:PaymentMeansCode", NO_MEANS_NAMED),
		element("cbc:PaymentDueDate", dueOn),
		element("cbc:PaymentID", number),
	])
}

function paymentTerms({ termsWords, discount, dueOn }: UblInvoice): Xml {
	return element("cac:PaymentTerms", [
		termsWords !== "" && element("cbc:Note", termsWords),
		discount && element("cbc:SettlementDiscountPercent", decimal(discount.basisPoints)),
		element("cbc:PaymentDueDate", dueOn),
		discount && element("cac:SettlementPeriod", [element("cbc:EndDate", discount.untilOn)]),
	])
}

function taxTotal(invoice: UblInvoice): Xml {
	const { taxCents, taxBasisPoints, taxPlace, isForResale, lines } = invoice
	const taxedCents = lines.reduce((sum, line) => sum + (line.taxCents > 0 ? line.lineCents : 0), 0)
	const isTaxed = taxCents > 0
	const reason = isForResale ? "Bought for resale, certificate on file" : "Nothing on it is taxed where it is sold"
	return element("cac:TaxTotal", [
		amount("cbc:TaxAmount", taxCents),
		element("cac:TaxSubtotal", [
			amount("cbc:TaxableAmount", isTaxed ? taxedCents : invoice.linesCents + invoice.deliveryCents),
			amount("cbc:TaxAmount", taxCents),
			element("cac:TaxCategory", [
				element("cbc:ID", isTaxed ? "S" : "E"),
				element("cbc:Percent", isTaxed ? decimal(taxBasisPoints) : "0"),
				!isTaxed && element("cbc:TaxExemptionReason", reason),
				element("cac:TaxScheme", [element("cbc:Name", taxPlace === "" ? "Sales tax" : `Sales tax, ${taxPlace}`)]),
			]),
		]),
	])
}

function monetaryTotal({ linesCents, deliveryCents, totalCents }: UblInvoice): Xml {
	return element("cac:LegalMonetaryTotal", [
		amount("cbc:LineExtensionAmount", linesCents),
		amount("cbc:TaxExclusiveAmount", linesCents + deliveryCents),
		amount("cbc:TaxInclusiveAmount", totalCents),
		deliveryCents > 0 && amount("cbc:ChargeTotalAmount", deliveryCents),
		amount("cbc:PayableAmount", totalCents),
	])
}

function invoiceLine(line: UblLine, position: number, { orders }: UblInvoice): Xml {
	const order = orders.length > 1 ? orders.find(({ number }) => number === line.orderNumber) : undefined
	const { quantity, price } = quantityAndPrice(line)
	return element("cac:InvoiceLine", [
		element("cbc:ID", String(position)),
		quantity,
		amount("cbc:LineExtensionAmount", line.lineCents),
		order ? element("cac:OrderLineReference", [element("cbc:LineID", String(position)), orderReference(order)]) : null,
		element("cac:Item", [
			line.detail !== "" && element("cbc:Description", line.detail),
			element("cbc:Name", line.name),
			line.code !== "" && element("cac:SellersItemIdentification", [element("cbc:ID", line.code)]),
			...line.lots.map((lot) =>
				element("cac:ItemInstance", [element("cac:LotIdentification", [element("cbc:LotNumberID", lot)])]),
			),
		]),
		price,
	])
}

/** Comb by weight is so many grams at the price of a pound, everything else so many cases at the price of a case. */
function quantityAndPrice(line: UblLine): { quantity: Xml; price: Xml } {
	const quantityOf = (count: number, unitCode: string) => element("cbc:InvoicedQuantity", String(count), { unitCode })
	if (line.poundCents !== null) {
		return {
			quantity: quantityOf(line.netGrams, UNIT.gram),
			price: element("cac:Price", [
				amount("cbc:PriceAmount", line.poundCents),
				element("cbc:BaseQuantity", GRAMS_PER_POUND, { unitCode: UNIT.gram }),
			]),
		}
	}
	const isCharge = line.cases === 0 && line.lineCents > 0
	return {
		quantity: isCharge ? quantityOf(1, UNIT.one) : quantityOf(line.cases, UNIT.case),
		price: element("cac:Price", [amount("cbc:PriceAmount", isCharge ? line.lineCents : line.caseCents)]),
	}
}
