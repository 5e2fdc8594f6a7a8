import { Form } from "react-router"
import { formatMoney, plainMoney } from "~/domain/money"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"
import { parseGiven } from "./parse-given"
import { type SaleInHand, saleFields } from "./sale-in-hand"

type CashGivenProps = {
	sale: SaleInHand
	totalCents: number
	likely: readonly number[]
	/** Whether another amount than a likely one is written. */
	isOther: boolean
	typed: string
}

/** What was handed over: a likely amount by one tap, or another one written. The choice is in the address. */
export function CashGiven({ sale, totalCents, likely, isOther, typed }: CashGivenProps) {
	const given = parseGiven(typed)
	return (
		<div className="cash-given">
			<Form method="get" replace preventScrollReset>
				<SaleFields sale={sale} />
				<fieldset>
					<legend>What did they give you?</legend>
					<div className="given">
						{likely.map((cents) => (
							<button
								key={cents}
								type="submit"
								name="given"
								value={plainMoney(cents)}
								aria-pressed={!isOther && given.ok && given.cents === cents}
							>
								<span className="fig">{formatMoney(cents).replace(/\.00$/, "")}</span>
								{cents === totalCents && <small>exact</small>}
							</button>
						))}
						<button type="submit" name="other" value="" aria-pressed={isOther}>
							Other
						</button>
					</div>
				</fieldset>
			</Form>
			{isOther && (
				<Form method="get" replace preventScrollReset className="cash-other">
					<SaleFields sale={sale} />
					<TextField
						name="other"
						label="Other amount"
						inputMode="decimal"
						autoComplete="off"
						autoFocus
						defaultValue={typed}
						error={given.ok || typed === "" ? undefined : given.message}
					/>
					<Button>Work out change</Button>
				</Form>
			)}
		</div>
	)
}

/** The sale at hand as hidden fields of a form. */
export function SaleFields({ sale }: { sale: SaleInHand }) {
	return saleFields(sale).map(([name, value]) => <input key={name} type="hidden" name={name} value={value} />)
}
