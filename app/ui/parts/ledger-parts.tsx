import { ButtonLink } from "~/ui/forms/button"
import { LedgerGroup, LedgerRow, WaitingRow } from "~/ui/layout/ledger"
import { EmptyLine, MarginNote, MessageLine, Totals, TotalsRow } from "~/ui/layout/sheet"
import { FillStrip } from "~/ui/stock/fill-strip"
import { PartGroup } from "./shown"

const NAME = "Share out basswood sections"
const STRIP = (
	<FillStrip
		runs={[
			{ state: "free", count: 9 },
			{ state: "short", count: 4 },
		]}
		caption={
			<>
				9 can be ready, <span className="short">4 short</span>
			</>
		}
	/>
)
const ACTION = <ButtonLink to="?share">Share out</ButtonLink>

/** Rows, notes and messages in every state. */
export function LedgerParts() {
	return (
		<>
			<PartGroup title="Ledger row">
				<div>
					<LedgerGroup when="Before noon">
						<LedgerRow name={NAME} line="Nine stores ask for 13 cases." strip={STRIP} action={ACTION} />
						<LedgerRow name={NAME} href="?open" strip={STRIP} action={ACTION} />
						<LedgerRow
							name={NAME}
							strip={STRIP}
							action={ACTION}
							state="chosen"
							note="Six more are likely on Wednesday."
						/>
						<LedgerRow
							name="The Long and Winding Lane Wholefoods and Cheese Counter of Upper Saltmarsh and Weir"
							line="A name of eighty characters takes the lines it needs."
							strip={STRIP}
							action={ACTION}
						/>
						<LedgerRow
							name={NAME}
							strip="6:58 pm, nine stores told"
							action={
								<ButtonLink variant="plain" to="?undo">
									Undo
								</ButtonLink>
							}
							state="settled"
						/>
						<LedgerRow
							name={NAME}
							strip={
								<span className="short">
									<b>Not sent: no answer from the server.</b> Nothing was promised.
								</span>
							}
							action={<ButtonLink to="?again">Try again</ButtonLink>}
						/>
						<WaitingRow />
					</LedgerGroup>
					<EmptyLine
						action={
							<ButtonLink variant="plain" to="?wednesday">
								See Wednesday
							</ButtonLink>
						}
					>
						Nothing to settle before noon tomorrow. The next orders close on Wednesday.
					</EmptyLine>
				</div>
				<Totals>
					<TotalsRow label="5 cases sure" note="31 lb 8 oz" value="$548.00" weight="strong" />
					<TotalsRow label="4 cases to be shared out" note="39 lb" value="up to $570.00" />
					<TotalsRow label="9 cases if all are met" note="70 lb 8 oz" value="$1,118.00" weight="sum" />
				</Totals>
			</PartGroup>
			<PartGroup title="Notes and messages">
				<MarginNote>
					Margin note: a reason or a hint, beside the row it is about, in italic, 120 characters at most.{" "}
					<b>The figure that matters</b> is in semibold.
				</MarginNote>
				<div className="grid gap-2.5">
					<MessageLine
						tone="problem"
						title="Could not save."
						action={
							<ButtonLink size="small" to="?again">
								Try again
							</ButtonLink>
						}
					>
						What you wrote is kept on this screen.
					</MessageLine>
					<MessageLine tone="signal" title="No signal.">
						3 sales wait on this phone; they go by themselves.
					</MessageLine>
					<MessageLine
						tone="saved"
						title="Nine stores told"
						action={
							<ButtonLink size="small" to="?undo">
								Undo
							</ButtonLink>
						}
					>
						at 6:58 pm.
					</MessageLine>
				</div>
			</PartGroup>
		</>
	)
}
