/** What must agree, and what it means when it does not. */
export const CHECKS = {
	invoices: {
		what: "Invoices issued, and what was entered as owed for them",
		why: "Tell whoever looks after this service: an invoice does not add up.",
	},
	"invoice-lines": {
		what: "Lines of these invoices, and what was entered as sold",
		why: "Tell whoever looks after this service: an invoice is not the sum of its lines.",
	},
	"credit-lines": {
		what: "Lines of credits, and what was entered as credited",
		why: "Tell whoever looks after this service: a credit is not the sum of its lines.",
	},
	"stall-lines": {
		what: "Pieces sold at the stall at their prices, and what was paid for them",
		why: "Look at the sales of the market days: a sale is not the sum of its pieces.",
	},
	payouts: {
		what: "Payments named by Stripe’s payouts, and what the payouts say before fees",
		why: "Money that goes back after its payment was paid out is taken off a later payout.",
	},
	fees: {
		what: "Fees noted on these payments, and the fees that the payouts took",
		why: "A fee for a dispute stands in the payout alone.",
	},
	owed: {
		what: "Open invoices less what stores have on account, and what they owe by the books",
		why: "Tell whoever looks after this service: a settlement is missing.",
	},
} as const
