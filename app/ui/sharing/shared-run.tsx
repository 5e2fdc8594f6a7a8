import { Form, Link } from "react-router"
import { casesWords } from "~/domain/quantity"
import type { SharingRule } from "~/domain/sharing/share-out"
import { RULE_NAMES } from "~/domain/sharing/share-words"
import { Button } from "~/ui/forms/button"
import { FillStrip } from "~/ui/stock/fill-strip"

type SharedRunProps = {
	run: {
		id: string
		rule: SharingRule
		supplyCases: number
		note: string
		/** "Aug 13, 6:52 pm by Ida Larkmoor". */
		when: string
		canUndo: boolean
		shares: readonly {
			lineId: string
			orderNumber: number
			storeName: string
			askedCases: number
			ruleCases: number
			givenCases: number
			sentence: string
		}[]
	}
	ordersHref: string
}

/** How a product was shared out: what each store got, what it reads, and while no letter has gone a way back. */
export function SharedRun({ run, ordersHref }: SharedRunProps) {
	return (
		<section className="share-run" aria-labelledby="shared">
			<div className="share-run-head">
				<h2 className="head-italic" id="shared">
					Shared out by {RULE_NAMES[run.rule].toLowerCase()}, {casesWords(run.supplyCases)}
				</h2>
				<p className="note">
					{run.when}
					{run.note && `. “${run.note}”`}
				</p>
				{run.canUndo && (
					<Form method="post">
						<input type="hidden" name="run" value={run.id} />
						<Button size="small" name="intent" value="undo">
							Take it back
						</Button>
					</Form>
				)}
			</div>
			<table className="sheet-table">
				<thead>
					<tr>
						<th scope="col">Store</th>
						<th scope="col">Given</th>
						<th scope="col">What it reads</th>
					</tr>
				</thead>
				<tbody>
					{run.shares.map((share) => (
						<tr key={share.lineId}>
							<td>
								<span className="name block text-body!">{share.storeName}</span>
								<Link className="note" to={`${ordersHref}/${share.orderNumber}`}>
									order {share.orderNumber}
								</Link>
							</td>
							<td>
								<FillStrip
									size="sm"
									countsThrough
									runs={[
										{ state: "promised", count: share.givenCases },
										{ state: "short", count: share.askedCases - share.givenCases },
									]}
									caption={
										<>
											<b>{share.givenCases}</b> of {share.askedCases}
											{share.givenCases !== share.ruleCases && `, ${share.ruleCases} by the rule`}
										</>
									}
								/>
							</td>
							<td>{share.sentence}</td>
						</tr>
					))}
				</tbody>
			</table>
		</section>
	)
}
