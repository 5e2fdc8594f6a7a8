import { Link } from "react-router"
import { formatMoney } from "~/domain/money"
import type { CreditWarning } from "~/domain/receivables/credit-standing"

/** Says at the desk why an order of a store should be looked at before it is promised. Nothing is refused for it. */
export function CreditNote({ warning, storeHref }: { warning: CreditWarning; storeHref: string }) {
	return (
		<p className="aside margin-rule mx-4 mb-4 desk:mx-8">
			{warning.kind === "stopped" ? (
				<>
					Orders of this store are <b>stopped</b> until you say otherwise.
				</>
			) : (
				<>
					With this order it owes more than its limit of <b>{formatMoney(warning.limitCents)}</b>; it owes{" "}
					{formatMoney(warning.owedCents)} now.
				</>
			)}{" "}
			You decide. <Link to={storeHref}>What it owes</Link>
		</p>
	)
}
