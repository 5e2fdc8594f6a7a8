import { Link, useSearchParams } from "react-router"
import { Button } from "~/ui/forms/button"
import { Dialog } from "~/ui/forms/dialog"
import { Stepper } from "~/ui/forms/stepper"
import { InvoicePaper } from "~/ui/layout/invoice-paper"
import { LedgerList, LedgerRow } from "~/ui/layout/ledger"
import { DayTabs } from "~/ui/shop/day-tabs"
import { ShopRow, ShopTally } from "~/ui/shop/shop-row"
import { FillStrip } from "~/ui/stock/fill-strip"
import { PartGroup } from "./shown"

const DAYS = [
	{ to: "?pick-up=15", title: "Saturday, August 15", detail: "Old Quay Market, 9 to 1", current: true },
	{ to: "?pick-up=22", title: "Saturday, August 22", detail: "Old Quay Market, 9 to 1", current: false },
]

/** Rows and tabs of the shop, the invoice, and a dialog that its address opens. */
export function PageParts() {
	const [search] = useSearchParams()
	return (
		<>
			<PartGroup title="Shop">
				<div className="min-w-0">
					<DayTabs label="Pick up at" tabs={DAYS} />
					<ul>
						<ShopRow
							no={11}
							name="Round section, clover"
							detail="Fancy, 8 oz"
							honey={{ tone: "straw", name: "light straw" }}
							picture="/art/section-round.svg"
							price="$14.00"
							stock={
								<FillStrip
									runs={[
										{ state: "free", count: 9 },
										{ state: "promised", count: 15 },
									]}
									caption="9 of 24 left"
								/>
							}
							field={<Stepper name="round" label="Round section, clover" defaultValue={1} max={9} />}
						/>
						<ShopRow
							no={12}
							name="Round section, goldenrod"
							detail="Fancy, 8 oz"
							honey={{ tone: "dark", name: "dark amber" }}
							picture="/art/section-round.svg"
							price="$15.00"
							stock={
								<FillStrip runs={[{ state: "expected", count: 20 }]} caption="still on the hives; from September 12" />
							}
							field="not yet"
						/>
					</ul>
					<ShopTally
						total="$14.00"
						note="We keep it cool under your name until 12:30."
						action={
							<Button type="button" variant="primary" size="big">
								Reserve
							</Button>
						}
					>
						<b>For Saturday at Old Quay:</b> 1 round section
					</ShopTally>
				</div>
			</PartGroup>
			<PartGroup title="Invoice">
				<InvoicePaper
					yard={{ name: "Larkmoor Bee Yard", contact: "Weld Lane, Teasel County. (555) 010-0142" }}
					title="Invoice 1203"
					date="August 18, 2026"
					blocks={[
						{ title: "To", name: "Pantry & Plume", lines: ["Rosa Quill", "12 Carder Street"] },
						{ title: "Please pay by", name: "Tuesday, September 1", lines: ["14 days", "Quote 1203"] },
					]}
					note="Basswood was short: you asked for four, and keep the price for four."
					care="Keep comb cool and flat, out of the sun."
					slip={[
						{ label: "Invoice", value: "1203" },
						{ label: "By September 1", value: "$285.00" },
					]}
					fine="One solid cell is one case sent; a bare line is one asked for and not sent."
				>
					<table className="paper-table">
						<thead>
							<tr>
								<th>Product</th>
								<th>Cases</th>
								<th className="money">Amount</th>
							</tr>
						</thead>
						<tbody>
							<tr>
								<td className="name">Basswood section, clover</td>
								<td>
									<FillStrip
										countsThrough
										runs={[
											{ state: "free", count: 2 },
											{ state: "short", count: 2 },
										]}
										caption="2 sent of 4 asked"
									/>
								</td>
								<td className="money">285.00</td>
							</tr>
						</tbody>
					</table>
				</InvoicePaper>
			</PartGroup>
			<PartGroup title="List and dialog">
				<LedgerList>
					<LedgerRow
						name="Pantry & Plume"
						line="Rows without a group"
						action={<Link to="?dialog">Open a dialog</Link>}
					/>
				</LedgerList>
				{search.has("dialog") && (
					<Dialog title="Cancel this order?" closeHref="?" actions={<Button type="button">Cancel the order</Button>}>
						Nine cases go back to the other stores.
					</Dialog>
				)}
			</PartGroup>
		</>
	)
}
