import { formatMoney, plainMoney } from "~/domain/money"
import { lineAmount } from "~/domain/pricing/weighed-line"
import { casesWords } from "~/domain/quantity"
import { exactWeightWords } from "~/domain/weight"
import { Totals, TotalsRow } from "~/ui/layout/sheet"
import { FillStrip } from "~/ui/stock/fill-strip"

/** A line of an order as it was placed; `givenCases` is null until the producer has decided. */
export type ShownLine = {
	code: string
	name: string
	detail: string
	askedCases: number
	givenCases: number | null
	isToShare: boolean
	/** Of a line to be shared out: the cases that are sure already. */
	promisedCases: number
	caseCents: number
	/** Set where it is priced by weight: `caseCents` is an estimate until `weighedGrams` is there. */
	poundCents: number | null
	weighedGrams: number | null
	piecesPerCase: number
}

/** Cases that are to be paid as things stand: given once decided, else asked; while it is to be shared out, what is sure. */
function sureCases(line: ShownLine): number {
	return line.givenCases ?? (line.isToShare ? line.promisedCases : line.askedCases)
}

const sureAmount = (line: ShownLine) => lineAmount({ ...line, cases: sureCases(line) })

const isOpenShare = (line: ShownLine) => line.isToShare && line.givenCases === null

function GivenCell({ line, isCancelled }: { line: ShownLine; isCancelled: boolean }) {
	if (isCancelled) return <span className="note">none</span>
	if (isOpenShare(line))
		return (
			<span className="note">
				{line.promisedCases > 0 ? `${line.promisedCases} sure, the rest` : ""} to be shared out
			</span>
		)
	if (line.givenCases === null) return <span className="note">not yet</span>
	if (line.givenCases >= line.askedCases) return line.givenCases
	return (
		<>
			<span className="short">
				<b>{line.givenCases}</b> of {line.askedCases}
			</span>
			<FillStrip
				size="sm"
				countsThrough
				runs={[
					{ state: "promised", count: line.givenCases },
					{ state: "short", count: line.askedCases - line.givenCases },
				]}
			/>
		</>
	)
}

/** "Fancy, case of 8", and of comb priced by weight what it weighed, or that it is still to be weighed. */
function lineFacts({ detail, piecesPerCase, poundCents, weighedGrams }: ShownLine): string {
	const facts = [detail, `case of ${piecesPerCase}`]
	if (poundCents !== null) {
		facts.push(weighedGrams === null ? "priced when it is weighed" : `weighed ${exactWeightWords(weighedGrams)}`)
	}
	return facts.filter(Boolean).join(", ")
}

function SureAmount({ line }: { line: ShownLine }) {
	const { cents, isEstimate } = sureAmount(line)
	return (
		<>
			{isEstimate && <i>about </i>}
			{plainMoney(cents)}
		</>
	)
}

/** The lines of a placed order: asked, given, price and amount as they were fixed. A cancelled one gives nothing. */
export function OrderLines({ lines, isCancelled }: { lines: readonly ShownLine[]; isCancelled: boolean }) {
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col" className="max-desk:hidden">
						No.
					</th>
					<th scope="col" className="max-desk:pl-4!">
						Product
					</th>
					<th scope="col" className="num">
						Asked, cases
					</th>
					<th scope="col" className="num">
						Given
					</th>
					<th scope="col" className="num max-desk:hidden">
						A case
					</th>
					<th scope="col" className="num pr-4! desk:pr-5!">
						Amount
					</th>
				</tr>
			</thead>
			<tbody>
				{lines.map((line) => (
					<tr key={line.code}>
						<td className="fig text-ink-faint max-desk:hidden">{line.code}</td>
						<td className="max-desk:pl-4!">
							<span className="name block text-body!">{line.name}</span>
							<span className="note">{lineFacts(line)}</span>
						</td>
						<td className="num fig">{line.askedCases}</td>
						<td className="num fig">
							<GivenCell line={line} isCancelled={isCancelled} />
						</td>
						<td className="money max-desk:hidden">
							{line.poundCents === null ? (
								plainMoney(line.caseCents)
							) : (
								<>
									{plainMoney(line.poundCents)} <span className="note">a lb</span>
								</>
							)}
						</td>
						<td className="money pr-4! desk:pr-5!">
							{isOpenShare(line) ? (
								<>
									<i>up to</i> {plainMoney(line.askedCases * line.caseCents)}
								</>
							) : (
								<SureAmount line={line} />
							)}
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

/** The sums of a placed order: goods that are sure, what may come of the sharing out, the way, and what is to pay. */
export function OrderSums({ lines, deliveryCents }: { lines: readonly ShownLine[]; deliveryCents: number }) {
	const sum = (of: (line: ShownLine) => number) => lines.reduce((total, line) => total + of(line), 0)
	const cases = sum(sureCases)
	const goodsCents = sum((line) => sureAmount(line).cents)
	const isEstimate = lines.some((line) => sureAmount(line).isEstimate)
	const sharedCases = sum((line) => (isOpenShare(line) ? line.askedCases - line.promisedCases : 0))
	const sharedCents = sum((line) => (isOpenShare(line) ? (line.askedCases - line.promisedCases) * line.caseCents : 0))
	return (
		<Totals>
			<TotalsRow
				label={sharedCases > 0 ? `${casesWords(cases)} sure` : casesWords(cases)}
				value={isEstimate ? `about ${formatMoney(goodsCents)}` : formatMoney(goodsCents)}
			/>
			{sharedCases > 0 && (
				<TotalsRow label={`${casesWords(sharedCases)} to be shared out`} value={`up to ${formatMoney(sharedCents)}`} />
			)}
			<TotalsRow label="Delivery" value={deliveryCents === 0 ? "free" : formatMoney(deliveryCents)} />
			<TotalsRow
				label={sharedCases > 0 ? "To pay, if all are met" : "To pay"}
				value={`${isEstimate ? "about " : ""}${formatMoney(goodsCents + sharedCents + deliveryCents)}`}
				weight="sum"
			/>
		</Totals>
	)
}
