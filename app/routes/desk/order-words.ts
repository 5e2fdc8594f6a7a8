import { sendingRefusalWords } from "~/domain/invoicing/refusal-words"
import { casesWords } from "~/domain/quantity"

type Refusal =
	| { reason: "no-such-order" | "nothing-given" | "not-confirmed" | "already-told" }
	| { reason: "not-placed" | "too-late"; state: string }
	| Parameters<typeof sendingRefusalWords>[1]
	| { reason: "not-confirmed"; state: string }
	| { reason: "lines"; refused: { reason: "more-than-asked" | "more-than-free"; mostCases: number }[] }
	| { reason: "nothing-changed" | "open-already" | "not-told" | "no-such-proposal" }
	| { reason: "answered-already"; state: string }
	| { reason: "change-lines"; refused: unknown[] }
	| { reason: "weights"; refused: unknown[] }
	| { reason: "lots-too-few"; productName: string; missingPieces: number }

/** Why a step of an order was refused, as one sentence for the head of the page. */
export function orderProblem(number: number, refusal: Refusal): string {
	switch (refusal.reason) {
		case "no-such-order":
			return "There is no such order."
		case "nothing-given":
			return "Give at least one case, or cancel the order."
		case "already-told":
			return `The store has been told of order ${number}. A change is a new decision now.`
		case "not-placed":
		case "too-late":
			return `Order ${number} is ${refusal.state} already. Nothing was changed.`
		case "not-confirmed":
			return "state" in refusal
				? `Order ${number} is ${refusal.state}. Nothing was moved.`
				: `Order ${number} is not confirmed any more. Nothing was changed.`
		case "lines":
			return `Order ${number} cannot be met in full any more. Open it and decide what it gets.`
		case "nothing-changed":
			return `Order ${number} is like that already. Nothing was changed.`
		case "open-already":
			return `A change to order ${number} waits for the store’s answer. Take it back first.`
		case "not-told":
			return "The letter of the confirmation has not gone yet: undo the confirmation and decide again."
		case "no-such-proposal":
			return "There is no such change to answer any more."
		case "answered-already":
			return refusal.state === "taken-back"
				? "That change was taken back."
				: `That change was ${refusal.state} already.`
		case "change-lines":
			return "There are not enough free cases for that any more. Nothing was changed."
		case "weights":
			return `Order ${number} has comb that is priced by weight. Weigh it on the packing page. Nothing was moved.`
		case "not-packed":
		case "lot-withdrawn":
		case "not-weighed":
		case "no-tax-rate":
		case "books-closed":
			return sendingRefusalWords(number, refusal)
		case "lots-too-few":
			return `${refusal.missingPieces} pieces of ${refusal.productName.toLowerCase()} are missing on the shelves: no released lot has them. Nothing was moved.`
	}
}

/** Why a line was refused, for the side of its field. */
export function lineProblem({
	reason,
	mostCases,
}: {
	reason: "more-than-asked" | "more-than-free"
	mostCases: number
}): string {
	if (reason === "more-than-asked") return "That is more than was asked for."
	return mostCases === 0 ? "None can be given." : `${casesWords(mostCases)} can be given.`
}
