import { WALKED_ORDER } from "./yard"

/** What a request may be answered with for those who are admitted; the default is any page, redirect or form refusal. */
type Answer = {
	/** Statuses for those who are admitted, where a page or redirect (GET) or a form's refusal (POST) is not what comes. */
	admitted?: readonly number[]
}

/** Whom a route admits: the words of its policy (app/routes/guard.server.ts) for its loader and, if any, its action. */
export type Admission = {
	loader: string
	get?: Answer
	action?: string
	/** `fields` are posted by everyone and change nothing of the demo; `effective` ones only by those not admitted. */
	post?: Answer & { fields?: Record<string, string>; effective?: Record<string, string> }
}

const STORE = "store: buyer, payer"
const OFFICE = "desk: owner, desk"
const COLD_ROOM = "desk: owner, desk, packer"
const GONE = { admitted: [410] }
const storePage: Admission = { loader: STORE }
const stallPage: Admission = { loader: "stall" }

/** A step that is asked for the walked store's order, which has been through all of them. */
function onOrder(intent: string): Record<string, string> {
	return { intent, number: WALKED_ORDER, day: "2001-02-06" }
}

/**
 * Whom each route of the site map admits, by the route's id. A route that is not here fails the walk, and so does one
 * here that is gone. Say it by the person's job (design.md, "The people"), not by copying what the route declares.
 */
export const admissions: Record<string, Admission> = {
	// Around every page
	root: { loader: "anyone" },

	// The public
	"routes/shop/home": { loader: "anyone" },
	"routes/shop/open-a-desk": { loader: "signed-in", action: "signed-in" },
	"routes/shop/front": { loader: "visitor" },
	"routes/shop/lot": { loader: "visitor" },
	// A link that was never sent is gone, for everyone.
	"routes/shop/notice": { loader: "visitor", get: GONE, action: "visitor" },
	"routes/parts": { loader: "anyone" },
	// Called by Stripe alone, and only by POST; what is not signed is refused, whoever sends it.
	"routes/webhooks/stripe": { loader: "anyone", get: { admitted: [405] }, action: "signer", post: { admitted: [400] } },

	// Signing in
	"routes/auth/sign-in": { loader: "anyone", action: "anyone" },
	"routes/auth/sign-in-code": { loader: "anyone", action: "anyone" },
	// A link that was never sent is gone, for everyone.
	"routes/auth/sign-in-link": { loader: "anyone", get: GONE, action: "anyone" },
	"routes/auth/go-on": { loader: "signed-in", action: "signed-in" },
	"routes/auth/sign-out": { loader: "anyone", action: "anyone" },
	"routes/auth/account": { loader: "signed-in" },
	// Without naming a session of one's own there is none to end.
	"routes/auth/sessions": { loader: "signed-in", action: "signed-in", post: { admitted: [404] } },
	"routes/auth/invitation": { loader: "anyone", get: GONE, action: "anyone" },

	// A store's people
	"routes/buy/stores": { loader: "any-buyer" },
	"routes/buy/store": storePage,
	"routes/buy/next-sheet": storePage,
	"routes/buy/sheet": { loader: STORE, action: STORE },
	"routes/buy/order": { loader: STORE, action: STORE, post: { fields: { intent: "cancel" } } },
	"routes/buy/deliveries": storePage,
	"routes/buy/standing": { loader: STORE, action: STORE },
	"routes/buy/standing-year": storePage,
	"routes/buy/invoices": storePage,
	"routes/buy/pay": { loader: "store: payer", action: "store: payer" },
	"routes/buy/payment-method": {
		loader: "store: payer",
		action: "store: payer",
		post: { fields: { intent: "automatic" } },
	},
	// A buyer reads what is to pay; paying is the payer's.
	"routes/buy/invoice": { loader: STORE, action: "store: payer", post: { fields: { intent: "pay" } } },
	"routes/buy/invoice-pdf": storePage,
	"routes/buy/invoice-ubl": storePage,
	// What is posted here lacks its report's own id.
	"routes/buy/breakage": { loader: STORE, action: STORE },
	"routes/buy/breakage-report": storePage,
	"routes/buy/breakage-photo": storePage,
	"routes/buy/credits": storePage,
	"routes/buy/credit": storePage,
	"routes/buy/credit-pdf": storePage,
	"routes/buy/statement": storePage,
	"routes/buy/statement-csv": storePage,
	"routes/buy/statement-pdf": storePage,
	// Without a file there is nothing to hand in.
	"routes/buy/certificate": { loader: STORE, action: STORE },
	"routes/buy/prices": storePage,
	"routes/buy/prices-csv": storePage,
	"routes/buy/prices-pdf": storePage,
	"routes/buy/details": { loader: STORE, action: STORE, post: { fields: { letters: "invoices" } } },

	// The desk: no stall volunteer; the packer sees what is packed and from which lots, and no money
	"routes/desk/to-do": { loader: COLD_ROOM, action: OFFICE, post: { fields: onOrder("confirm") } },
	"routes/desk/season": { loader: OFFICE },
	"routes/desk/season-csv": { loader: OFFICE },
	"routes/desk/orders": { loader: OFFICE },
	"routes/desk/order": { loader: OFFICE, action: OFFICE, post: { fields: { intent: "confirm" } } },
	"routes/desk/sharing": { loader: OFFICE },
	"routes/desk/sharing-product": { loader: OFFICE, action: OFFICE },
	"routes/desk/packing-slip": { loader: COLD_ROOM },
	"routes/desk/packing-slip-pdf": { loader: COLD_ROOM },
	"routes/desk/invoice-run": { loader: COLD_ROOM },
	"routes/desk/packing": { loader: COLD_ROOM, action: COLD_ROOM, post: { fields: onOrder("pack") } },
	// The crop: whoever works in the yard sees it.
	"routes/desk/crop": { loader: COLD_ROOM },
	// Nothing chosen, nothing changed.
	"routes/desk/crop-mark": { loader: COLD_ROOM, action: COLD_ROOM, post: { fields: { intent: "escape-in" } } },
	"routes/desk/crop-set-up": { loader: OFFICE, action: OFFICE, post: { fields: { intent: "yard" } } },
	"routes/desk/crop-set-up-yard": { loader: OFFICE, action: OFFICE, post: { fields: { intent: "retire" } } },
	"routes/desk/crop-forecasts": { loader: COLD_ROOM },
	"routes/desk/crop-settings": { loader: "desk: owner", action: "desk: owner", post: { fields: { figure: "none" } } },
	// In the yard: whoever works for the producer looks into supers. A check of no super is a refusal in words.
	"routes/desk/check": { loader: COLD_ROOM, action: COLD_ROOM },
	"routes/desk/yard-round": { loader: COLD_ROOM, action: COLD_ROOM },
	"routes/desk/super": { loader: COLD_ROOM, action: COLD_ROOM },
	"routes/desk/super-photo": { loader: COLD_ROOM },
	// Whoever works in the cold room brings in, grades and regroups; an empty form is refused.
	"routes/desk/harvest": { loader: COLD_ROOM, action: COLD_ROOM },
	"routes/desk/grade": { loader: COLD_ROOM, action: COLD_ROOM },
	"routes/desk/grade-sheet": { loader: COLD_ROOM },
	"routes/desk/regroup": { loader: COLD_ROOM, action: COLD_ROOM },
	// What grades ask and how lots are named is the owner's.
	"routes/desk/grades": { loader: "desk: owner", action: "desk: owner" },
	"routes/desk/cold-room": { loader: COLD_ROOM, action: COLD_ROOM },
	// What freezers held is in the demo's own loads: the first is there for everyone who is admitted.
	"routes/desk/load": { loader: COLD_ROOM, action: COLD_ROOM },
	"routes/desk/load-readings": { loader: COLD_ROOM, action: COLD_ROOM },
	"routes/desk/load-readings-json": { loader: COLD_ROOM, get: { admitted: [405] }, action: COLD_ROOM },
	// Without proofs, and without a reason, nothing is released.
	"routes/desk/release": { loader: COLD_ROOM, action: COLD_ROOM, post: { fields: { intent: "proven" } } },
	"routes/desk/lots": { loader: COLD_ROOM },
	"routes/desk/lot": { loader: COLD_ROOM },
	"routes/desk/lot-trace": { loader: COLD_ROOM },
	"routes/desk/lot-label": { loader: COLD_ROOM },
	"routes/desk/lot-qr": { loader: COLD_ROOM },
	"routes/desk/order-lots": { loader: OFFICE },
	"routes/desk/trace": { loader: COLD_ROOM },
	"routes/desk/withdrawals": { loader: OFFICE },
	// Without the lot in question there is nothing to withdraw.
	"routes/desk/withdrawal-new": { loader: OFFICE, action: OFFICE },
	"routes/desk/withdrawal": { loader: OFFICE },
	"routes/desk/withdrawal-poster": { loader: OFFICE },
	"routes/desk/records": { loader: OFFICE },
	"routes/desk/records-csv": { loader: OFFICE },
	// What is posted here lacks its check's own id.
	"routes/desk/scale": { loader: COLD_ROOM, action: COLD_ROOM, post: { admitted: [400] } },
	"routes/desk/scale-check": { loader: COLD_ROOM },
	"routes/desk/move-pieces": { loader: COLD_ROOM, action: COLD_ROOM },
	"routes/desk/stock-takes": { loader: COLD_ROOM },
	// Without a place in the address there is nothing to count.
	"routes/desk/stock-take": { loader: COLD_ROOM, action: COLD_ROOM, post: { admitted: [400] } },
	"routes/desk/stock-take-result": { loader: COLD_ROOM },
	"routes/desk/why-free": { loader: COLD_ROOM },
	"routes/desk/invoices": { loader: OFFICE },
	"routes/desk/invoice": {
		loader: OFFICE,
		action: OFFICE,
		post: {
			effective: {
				method: "cash",
				amount: "5.00",
				receivedOn: "2026-08-03",
				paymentId: "6f0c5a52-3a2c-4f0e-9f6b-2f4f5f1d9a11",
			},
		},
	},
	"routes/desk/payments": { loader: OFFICE },
	"routes/desk/payment": { loader: OFFICE, action: OFFICE, post: { fields: { intent: "bounce" } } },
	"routes/desk/payment-new": { loader: OFFICE, action: OFFICE },
	// Nothing is found under an id that names no difference.
	"routes/desk/stripe-differences": {
		loader: OFFICE,
		action: OFFICE,
		post: { fields: { difference: "6f0c5a52-3a2c-4f0e-9f6b-2f4f5f1d9a11" } },
	},
	"routes/desk/invoices-waiting": { loader: OFFICE, action: OFFICE },
	"routes/desk/tax-rates": { loader: OFFICE, action: OFFICE },
	"routes/desk/invoice-pdf": { loader: OFFICE },
	// The bookkeeper's settings and the closing are the owner's; without a name or a day nothing is set or closed.
	"routes/desk/books": { loader: OFFICE },
	"routes/desk/books-csv": { loader: OFFICE },
	"routes/desk/books-accounts": { loader: "desk: owner", action: "desk: owner" },
	"routes/desk/books-close": { loader: "desk: owner", action: "desk: owner" },
	"routes/desk/figures": { loader: OFFICE },
	"routes/desk/figures-csv": { loader: OFFICE },
	"routes/desk/invoice-ubl": { loader: OFFICE },
	// Without a reason nothing is credited.
	"routes/desk/credit-new": { loader: OFFICE, action: OFFICE },
	"routes/desk/breakage": { loader: OFFICE },
	"routes/desk/breakage-where": { loader: OFFICE },
	"routes/desk/breakage-where-csv": { loader: OFFICE },
	// The walked report is answered: it is not answered again.
	"routes/desk/breakage-report": {
		loader: OFFICE,
		action: OFFICE,
		post: { admitted: [409, 422], fields: { intent: "decline", answer: "walked" } },
	},
	"routes/desk/breakage-photo": { loader: OFFICE },
	"routes/desk/credits": { loader: OFFICE },
	"routes/desk/credit": { loader: OFFICE },
	"routes/desk/credit-pdf": { loader: OFFICE },
	"routes/desk/stores": { loader: OFFICE },
	"routes/desk/store-new": { loader: "desk: owner", action: "desk: owner", post: { admitted: [400] } },
	// A promise without an amount is refused.
	"routes/desk/store": { loader: OFFICE, action: OFFICE, post: { fields: { intent: "promise" } } },
	// Without its button's own key nothing is mailed.
	"routes/desk/statement": { loader: OFFICE, action: OFFICE, post: { admitted: [400] } },
	"routes/desk/statement-csv": { loader: OFFICE },
	"routes/desk/statement-pdf": { loader: OFFICE },
	"routes/desk/certificate": { loader: OFFICE, action: OFFICE },
	"routes/desk/certificate-file": { loader: OFFICE },
	"routes/desk/receivables": { loader: OFFICE },
	"routes/desk/receivables-csv": { loader: OFFICE },
	"routes/desk/reminders": { loader: OFFICE, action: "desk: owner", post: { fields: { intent: "finance" } } },
	"routes/desk/commitments": { loader: OFFICE, action: "desk: owner" },
	"routes/desk/prices": { loader: OFFICE },
	"routes/desk/price-list-csv": { loader: OFFICE },
	"routes/desk/price-list-pdf": { loader: OFFICE },
	"routes/desk/price-new": { loader: OFFICE, action: OFFICE },
	"routes/desk/price-special": { loader: OFFICE, action: OFFICE },
	"routes/desk/price-upload": { loader: OFFICE, action: OFFICE },
	// People are the owner's alone.
	"routes/desk/people": { loader: "desk: owner", action: "desk: owner", post: { fields: { intent: "invite" } } },

	// The stall
	"routes/stall/days": stallPage,
	"routes/stall/sale": { loader: "stall", action: "stall" },
	"routes/stall/cash": { loader: "stall", action: "stall" },
	"routes/stall/card": { loader: "stall", action: "stall" },
	"routes/stall/totals": stallPage,
}
