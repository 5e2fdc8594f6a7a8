import { Form, Link } from "react-router"
import type { OrderState } from "~/domain/orders/order-states"
import { Button } from "~/ui/forms/button"

type Order = {
	number: number
	state: OrderState
	deliveryOn: string
	storeName: string
	invoiceNumber: string | null
	canUndo: boolean
	lines: readonly { poundCents: number | null; givenCases: number | null }[]
}

/** The next step of each state: its intent, and the words on its button. */
const NEXT: Partial<Record<OrderState, { intent: string; words: string }>> = {
	confirmed: { intent: "pack", words: "Packed" },
	packed: { intent: "send", words: "Sent, issue the invoice" },
	sent: { intent: "receive", words: "It has arrived" },
}

/** What can be done with an order now: the next step as the one filled button, and the ways back. */
export function OrderSteps({ order, base }: { order: Order; base: string }) {
	const isToWeigh =
		order.state === "confirmed" &&
		order.lines.some(({ poundCents, givenCases }) => poundCents !== null && (givenCases ?? 0) > 0)
	const next = isToWeigh ? undefined : NEXT[order.state]
	const canCancel = order.state === "placed" || order.state === "confirmed" || order.state === "packed"
	return (
		<div className="grid content-start gap-3">
			{next && (
				<Form method="post">
					<Button variant="primary" size="big" name="intent" value={next.intent} className="w-full">
						{next.words}
					</Button>
				</Form>
			)}
			{isToWeigh && (
				<Link className="btn primary big" to={`${base}/packing?day=${order.deliveryOn}#order-${order.number}`}>
					Weigh and pack it
				</Link>
			)}
			{(order.state === "packed" || order.state === "sent") && (
				<Link className="btn" to={`${base}/orders/${order.number}/packing-slip`}>
					Packing slip
				</Link>
			)}
			{order.invoiceNumber && (
				<Link className="btn" to={`${base}/invoices/${order.invoiceNumber}`}>
					Invoice {order.invoiceNumber}
				</Link>
			)}
			{order.canUndo && (
				<Form method="post">
					<Button name="intent" value="undo" className="w-full">
						Undo the confirmation
					</Button>
				</Form>
			)}
			{canCancel && (
				<Form method="post" className="grid gap-1">
					<Button name="intent" value="cancel">
						Cancel this order
					</Button>
					<p className="note">No letter goes out: tell {order.storeName} yourself.</p>
				</Form>
			)}
		</div>
	)
}
