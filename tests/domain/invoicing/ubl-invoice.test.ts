import { describe, expect, test } from "vitest"
import { type UblInvoice, ublInvoice } from "~/domain/invoicing/ubl-invoice"
import { type Element, readXml } from "./read-xml"

/**
 * Elements in the order of their sequences, "+" after those that must be there. Source: OASIS, Universal Business Language
 * Version 2.1, xsd/maindoc/UBL-Invoice-2.1.xsd and xsd/common/UBL-CommonAggregateComponents-2.1.xsd (source read in the
 * public review draft of May 2013, which has the order of the standard; AddressType, AllowanceChargeType, ContactType,
 * DeliveryType, ItemInstance and LotIdentification in part from memory, high). Only elements up to the last that is
 * written stand here where a sequence is long.
 */
const SEQUENCES: Record<string, string> = {
	Invoice:
		"UBLExtensions UBLVersionID CustomizationID ProfileID ProfileExecutionID ID+ CopyIndicator UUID IssueDate+ IssueTime DueDate InvoiceTypeCode Note TaxPointDate DocumentCurrencyCode TaxCurrencyCode PricingCurrencyCode PaymentCurrencyCode PaymentAlternativeCurrencyCode AccountingCostCode AccountingCost LineCountNumeric BuyerReference InvoicePeriod OrderReference BillingReference DespatchDocumentReference ReceiptDocumentReference StatementDocumentReference OriginatorDocumentReference ContractDocumentReference AdditionalDocumentReference ProjectReference Signature AccountingSupplierParty+ AccountingCustomerParty+ PayeeParty BuyerCustomerParty SellerSupplierParty TaxRepresentativeParty Delivery DeliveryTerms PaymentMeans PaymentTerms PrepaidPayment AllowanceCharge TaxExchangeRate PricingExchangeRate PaymentExchangeRate PaymentAlternativeExchangeRate TaxTotal WithholdingTaxTotal LegalMonetaryTotal+ InvoiceLine+",
	OrderReference: "ID+ SalesOrderID CopyIndicator UUID IssueDate IssueTime CustomerReference OrderTypeCode",
	AccountingSupplierParty: "CustomerAssignedAccountID AdditionalAccountID DataSendingCapability Party",
	AccountingCustomerParty: "CustomerAssignedAccountID SupplierAssignedAccountID AdditionalAccountID Party",
	Party:
		"WebsiteURI LogoReferenceID EndpointID IndustryClassificationCode PartyIdentification PartyName Language PostalAddress PhysicalLocation PartyTaxScheme PartyLegalEntity Contact Person",
	PartyName: "Name+",
	PostalAddress: "ID StreetName CityName PostalZone CountrySubentity AddressLine Country",
	AddressLine: "Line+",
	Contact: "ID Name Telephone Telefax ElectronicMail Note",
	Delivery: "ID Quantity MinimumQuantity MaximumQuantity ActualDeliveryDate ActualDeliveryTime",
	PaymentMeans: "ID PaymentMeansCode+ PaymentDueDate PaymentChannelCode InstructionID InstructionNote PaymentID",
	PaymentTerms:
		"ID PaymentMeansID PrepaidPaymentReferenceID Note ReferenceEventCode SettlementDiscountPercent PenaltySurchargePercent PaymentPercent Amount SettlementDiscountAmount PenaltyAmount PaymentTermsDetailsURI PaymentDueDate InstallmentDueDate InvoicingPartyReference SettlementPeriod",
	SettlementPeriod: "StartDate StartTime EndDate EndTime",
	AllowanceCharge:
		"ID ChargeIndicator+ AllowanceChargeReasonCode AllowanceChargeReason MultiplierFactorNumeric PrepaidIndicator SequenceNumeric Amount+",
	TaxTotal: "TaxAmount+ RoundingAmount TaxEvidenceIndicator TaxIncludedIndicator TaxSubtotal",
	TaxSubtotal:
		"TaxableAmount TaxAmount+ CalculationSequenceNumeric TransactionCurrencyTaxAmount Percent BaseUnitMeasure PerUnitAmount TierRange TierRatePercent TaxCategory+",
	TaxCategory:
		"ID Name Percent BaseUnitMeasure PerUnitAmount TaxExemptionReasonCode TaxExemptionReason TierRange TierRatePercent TaxScheme+",
	TaxScheme: "ID Name TaxTypeCode CurrencyCode",
	LegalMonetaryTotal:
		"LineExtensionAmount TaxExclusiveAmount TaxInclusiveAmount AllowanceTotalAmount ChargeTotalAmount PrepaidAmount PayableRoundingAmount PayableAmount+",
	InvoiceLine:
		"ID+ UUID Note InvoicedQuantity LineExtensionAmount+ TaxPointDate AccountingCostCode AccountingCost PaymentPurposeCode FreeOfChargeIndicator InvoicePeriod OrderLineReference DespatchLineReference ReceiptLineReference BillingReference DocumentReference PricingReference OriginatorParty Delivery PaymentTerms AllowanceCharge TaxTotal WithholdingTaxTotal Item+ Price",
	OrderLineReference: "LineID+ SalesOrderLineID UUID LineStatusCode OrderReference",
	Item: "Description PackQuantity PackSizeNumeric CatalogueIndicator Name HazardousRiskIndicator AdditionalInformation Keyword BrandName ModelName BuyersItemIdentification SellersItemIdentification ManufacturersItemIdentification StandardItemIdentification OriginAddress ItemInstance",
	SellersItemIdentification: "ID+",
	ItemInstance:
		"ProductTraceID ManufactureDate ManufactureTime BestBeforeDate RegistrationID SerialID AdditionalItemProperty LotIdentification",
	LotIdentification: "LotNumberID ExpiryDate",
	Price: "PriceAmount+ BaseQuantity",
}

const MAY_REPEAT = new Set(["Note", "Delivery", "InvoiceLine", "ItemInstance", "AddressLine"])

/** Every fault of an element and all in it against the sequences above. */
function faultsOf(element: Element): string[] {
	const own = element.children
	if (own.length === 0) return []
	const sequence = SEQUENCES[element.name]?.split(" ")
	if (!sequence) return [`${element.name} has no sequence`]
	const names = sequence.map((entry) => entry.replace("+", ""))
	const places = own.map((child) => names.indexOf(child.name))
	const wrong = own.filter((_, index) => (places[index] ?? -1) < 0).map((child) => `${child.name} in ${element.name}`)
	const unordered = places.some((place, index) => index > 0 && place < (places[index - 1] ?? 0))
	const repeated = own.filter(
		(child, index) => !MAY_REPEAT.has(child.name) && own.findIndex(({ name }) => name === child.name) < index,
	)
	const missing = sequence
		.filter((entry) => entry.endsWith("+"))
		.map((entry) => entry.slice(0, -1))
		.filter((name) => !own.some((child) => child.name === name))
	return [
		...wrong,
		...(unordered ? [`order in ${element.name}`] : []),
		...repeated.map((child) => `${child.name} twice in ${element.name}`),
		...missing.map((name) => `no ${name} in ${element.name}`),
		...own.flatMap(faultsOf),
	]
}

const invoice: UblInvoice = {
	number: "2026-0012",
	issuedOn: "2026-08-18",
	dueOn: "2026-09-17",
	notes: ["Basswood was short."],
	supplier: {
		name: "Larkmoor Bee Yard",
		address: "Weld Lane, Teasel County",
		contactName: "Ida",
		email: "orders@larkmoor.example.test",
		phone: "(555) 010-0142",
	},
	customer: { name: "Pantry & Plume <east>", address: "12 Carder Street", contactName: null, email: null, phone: null },
	orders: [{ number: 318, poNumber: "4471", deliveredOn: "2026-08-18" }],
	termsWords: "2 % off within 10 days, net 30 days",
	discount: { basisPoints: 200, untilOn: "2026-08-28" },
	lines: [
		{
			code: "11",
			name: "Round section, clover",
			detail: "Fancy, 8 oz",
			lots: ["R09", "R11"],
			orderNumber: 318,
			cases: 3,
			caseCents: 10_830,
			poundCents: null,
			netGrams: 8_136,
			lineCents: 32_490,
			taxCents: 0,
		},
		{
			code: "51",
			name: "Bulk frame, clover",
			detail: "",
			lots: ["F02"],
			orderNumber: 318,
			cases: 1,
			caseCents: 9_000,
			poundCents: 1_250,
			netGrams: 4_423,
			lineCents: 12_189,
			taxCents: 884,
		},
	],
	linesCents: 44_679,
	deliveryCents: 1_800,
	taxCents: 884,
	totalCents: 47_363,
	taxBasisPoints: 725,
	taxPlace: "Teasel County",
	isForResale: false,
}

const at = (root: Element, ...path: string[]) =>
	path.reduce<Element | undefined>((element, name) => element?.children.find((child) => child.name === name), root)

describe("an invoice as UBL", () => {
	test("has every element that the schema asks for, in its order, and none that it does not know", () => {
		expect(faultsOf(readXml(ublInvoice(invoice)))).toEqual([])
		const several = {
			...invoice,
			orders: [...invoice.orders, { number: 325, poNumber: "", deliveredOn: "2026-08-25" }],
			discount: null,
			isForResale: true,
			taxCents: 0,
			deliveryCents: 0,
			totalCents: 44_679,
		}
		expect(faultsOf(readXml(ublInvoice(several)))).toEqual([])
	})

	test("the check above finds what is missing, out of order and unknown", () => {
		const xml = ublInvoice(invoice)
		expect(faultsOf(readXml(xml.replace(/<cbc:IssueDate>.*?<\/cbc:IssueDate>/, "")))).toEqual([
			"no IssueDate in Invoice",
		])
		expect(
			faultsOf(
				readXml(
					xml
						.replace("<cbc:UBLVersionID>2.1</cbc:UBLVersionID>", "")
						.replace("</Invoice>", "<cbc:UBLVersionID>2.1</cbc:UBLVersionID></Invoice>"),
				),
			),
		).toEqual(["order in Invoice"])
		expect(faultsOf(readXml(xml.replace("<cac:Price>", "<cac:Price><cbc:Free>1</cbc:Free>")))).toEqual([
			"Free in Price",
		])
	})

	test("names its namespaces, its version and its money", () => {
		const xml = ublInvoice(invoice)
		expect(
			xml.startsWith(
				'<?xml version="1.0" encoding="UTF-8"?>\n<Invoice xmlns="urn:oasis:names:specification:ubl:schema:xsd:Invoice-2"',
			),
		).toBe(true)
		const root = readXml(xml)
		expect(at(root, "UBLVersionID")?.text).toBe("2.1")
		expect(at(root, "LegalMonetaryTotal", "PayableAmount")).toMatchObject({
			text: "473.63",
			attributes: { currencyID: "USD" },
		})
		expect(at(root, "LegalMonetaryTotal", "TaxExclusiveAmount")?.text).toBe("464.79")
		expect(at(root, "PaymentTerms", "SettlementDiscountPercent")?.text).toBe("2.00")
		expect(at(root, "PaymentTerms", "SettlementPeriod", "EndDate")?.text).toBe("2026-08-28")
		expect(at(root, "OrderReference", "ID")?.text).toBe("4471")
	})

	test("writes comb by weight as grams at the price of a pound, and the rest as cases", () => {
		const lines = readXml(ublInvoice(invoice)).children.filter(({ name }) => name === "InvoiceLine")
		expect(lines.map((line) => at(line, "InvoicedQuantity"))).toMatchObject([
			{ text: "3", attributes: { unitCode: "XCS" } },
			{ text: "4423", attributes: { unitCode: "GRM" } },
		])
		expect(at(lines[1] as Element, "Price", "BaseQuantity")?.text).toBe("453.59237")
		expect(
			(lines[0] as Element).children
				.find(({ name }) => name === "Item")
				?.children.filter(({ name }) => name === "ItemInstance"),
		).toHaveLength(2)
	})

	test("keeps names whole and leaves out what XML cannot hold", () => {
		const odd = { ...invoice, customer: { ...invoice.customer, name: 'Łódź & "Sons" <b>\u0007 \ud83d\udc1d \ud800' } }
		const root = readXml(ublInvoice(odd))
		expect(at(root, "AccountingCustomerParty", "Party", "PartyName", "Name")?.text).toBe('Łódź & "Sons" <b> 🐝 ')
	})
})
