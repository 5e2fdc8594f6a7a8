import { fullDay } from "~/domain/calendar"
import { boxesOf, lotWords, type PackingSlip, slipParties } from "~/domain/orders/packing-slip"
import { casesWords } from "~/domain/quantity"
import { InvoicePaper } from "~/ui/layout/invoice-paper"

/** The packing slip of an order on its paper, as it prints. */
export function PackingSlipDocument({ slip }: { slip: PackingSlip }) {
	const { yard, lines } = slip
	return (
		<InvoicePaper
			yard={{ name: yard.name, contact: [yard.address, yard.email, yard.phone].filter(Boolean).join(". ") }}
			title={`Packing slip ${slip.orderNumber}`}
			date={fullDay(slip.deliveryOn)}
			blocks={slipParties(slip).map(({ group, name, facts }) => ({ title: group, name, lines: facts }))}
			note={slip.note}
			care={slip.care}
			fine="One box is one case."
		>
			<table className="paper-table">
				<thead>
					<tr>
						<th scope="col" className="wide-only">
							No.
						</th>
						<th scope="col">Product</th>
						<th scope="col">Lot</th>
						<th scope="col" className="wide-only">
							Net weight
						</th>
						<th scope="col">Cases</th>
					</tr>
				</thead>
				<tbody>
					{lines.map((line) => (
						<tr key={line.code}>
							<td className="fig wide-only">{line.code}</td>
							<td>
								<span className="name">{line.name}</span>
								{line.detail && <span className="note">{line.detail}</span>}
							</td>
							<td>
								{line.lots.map((lot) => (
									<span className="note block" key={lot.code}>
										{lotWords(lot)}
									</span>
								))}
							</td>
							<td className="fig wide-only">{line.netWeight}</td>
							<td>
								<Boxes count={boxesOf(line.cases)} />
								<span className="note block">{casesWords(line.cases)}</span>
							</td>
						</tr>
					))}
				</tbody>
			</table>
			<dl className="paper-sign">
				{["Taken in by", "Day and time", "Broken pieces"].map((words) => (
					<div key={words}>
						<dt>{words}</dt>
						<dd />
					</div>
				))}
			</dl>
		</InvoicePaper>
	)
}

const BOX = { size: 14, step: 19, inRow: 6 }

/** An empty box for each case, to be ticked by hand; the words beside it say how many. */
function Boxes({ count }: { count: number }) {
	if (count === 0) return null
	const wide = Math.min(count, BOX.inRow) * BOX.step
	const high = Math.ceil(count / BOX.inRow) * BOX.step
	const squares = Array.from({ length: count }, (_, index) => {
		const [x, y] = [(index % BOX.inRow) * BOX.step, Math.floor(index / BOX.inRow) * BOX.step]
		return `M${x + 0.5} ${y + 0.5}h${BOX.size}v${BOX.size}h${-BOX.size}z`
	})
	return (
		<svg width={wide} height={high} viewBox={`0 0 ${wide} ${high}`} aria-hidden="true">
			<path d={squares.join("")} fill="none" stroke="currentColor" />
		</svg>
	)
}
