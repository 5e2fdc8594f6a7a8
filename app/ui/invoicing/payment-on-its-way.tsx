import { useEffect } from "react"
import { useRevalidator } from "react-router"
import { MessageLine } from "~/ui/layout/sheet"

const LOOK_AGAIN_MS = 2_000

/**
 * Says that a payment has been made, or a way to pay kept, and is not in yet, and looks again by itself: with a script every two seconds,
 * without one by the browser's own refresh.
 */
export function PaymentOnItsWay({ what = "paid" }: { what?: "paid" | "kept" }) {
	const { revalidate, state } = useRevalidator()
	useEffect(() => {
		if (state !== "idle") return
		const timer = setTimeout(revalidate, LOOK_AGAIN_MS)
		return () => clearTimeout(timer)
	}, [revalidate, state])
	return (
		<>
			<noscript>
				<meta httpEquiv="refresh" content="5" />
			</noscript>
			<MessageLine
				tone="saved"
				title={what === "paid" ? "Your payment is on its way." : "The payment service is writing it down."}
			>
				This page shows it as soon as it is in; you need not wait here.
			</MessageLine>
		</>
	)
}
