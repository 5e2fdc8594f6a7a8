import { type Day, fullDay } from "~/domain/calendar"

type InvoiceRefusal =
	| { reason: "not-weighed"; orderNumber: number; productName: string }
	| { reason: "no-tax-rate"; place: string }
	| { reason: "books-closed"; until: Day }

type SendingRefusal =
	| InvoiceRefusal
	| { reason: "no-such-order" }
	| { reason: "not-packed"; state: string }
	| { reason: "lot-withdrawn"; lotCode: string }

/** Why orders cannot be invoiced as they are, in one sentence with what to do about it. */
export function invoiceRefusalWords(refusal: InvoiceRefusal): string {
	switch (refusal.reason) {
		case "not-weighed":
			return `${refusal.productName} in order ${refusal.orderNumber} is sold by weight and was not weighed. Take the order back, weigh it and pack it again.`
		case "no-tax-rate":
			return `No sales-tax rate of ${refusal.place} has begun. Write one under Sales tax, or give the store another place.`
		case "books-closed":
			return `The books are closed until ${fullDay(refusal.until)}, so nothing can be invoiced on a day before that.`
	}
}

/** Why an order was not sent, in one sentence. */
export function sendingRefusalWords(number: number, refusal: SendingRefusal): string {
	switch (refusal.reason) {
		case "no-such-order":
			return "There is no such order."
		case "not-packed":
			return `Order ${number} is ${refusal.state} already. Nothing was changed.`
		case "lot-withdrawn":
			return `Order ${number} was packed from lot ${refusal.lotCode}, which is withdrawn. It must not leave: cancel it and put its pieces back.`
		default:
			return invoiceRefusalWords(refusal)
	}
}
