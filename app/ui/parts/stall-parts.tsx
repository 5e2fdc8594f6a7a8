import { Button } from "~/ui/forms/button"
import { StallItem } from "~/ui/stall/stall-item"
import { GiveBack, StallPay } from "~/ui/stall/stall-pay"
import { PartGroup } from "./shown"

const BUTTON = { type: "button" } as const

/** The stall's rows and its foot, in sun mode. */
export function StallParts() {
	return (
		<PartGroup title="Stall">
			<div className="grid gap-6 desk:grid-cols-2">
				<div className="stall min-h-0! border border-rule" data-mode="sun">
					<StallItem piece="round" name="Round" price="$14.00" left={7} inSale={1} add={BUTTON} fewer={BUTTON} />
					<StallItem piece="basswood" name="Basswood" price="$18.50" left={2} inSale={1} add={BUTTON} fewer={BUTTON} />
					<StallItem
						piece="clear-box"
						name="Clear-box"
						price="$16.00"
						left={11}
						inSale={0}
						add={BUTTON}
						fewer={BUTTON}
					/>
					<StallItem piece="cut-comb" name="Cut comb" price="$17.00" left={0} inSale={8} add={BUTTON} fewer={BUTTON} />
					<StallItem
						piece="half-piece"
						name="Half piece"
						price="$9.50"
						left={0}
						inSale={0}
						add={BUTTON}
						fewer={BUTTON}
					/>
					<StallItem
						piece="chunk-jar"
						name="Chunk jar"
						price="$19.00"
						left={6}
						inSale={0}
						add={BUTTON}
						fewer={BUTTON}
					/>
				</div>
				<div className="grid content-start gap-6">
					<div className="stall min-h-0!" data-mode="sun">
						<GiveBack
							total="$10.50"
							pieces={[
								{ cents: 1000, count: 1, words: "one $10 bill", amount: "10.00" },
								{ cents: 25, count: 2, words: "two quarters", amount: "0.50" },
							]}
						/>
					</div>
					<div className="stall min-h-0!" data-mode="sun">
						<StallPay
							total="$49.50"
							ways={
								<>
									<Button type="button" icon="cash" iconSize={26}>
										Take cash
									</Button>
									<Button type="button" variant="primary" icon="card" iconSize={26} disabledReason="card needs signal">
										Take card
									</Button>
								</>
							}
						>
							3 pieces
						</StallPay>
					</div>
				</div>
			</div>
		</PartGroup>
	)
}
