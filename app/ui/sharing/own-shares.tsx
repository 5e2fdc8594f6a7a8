import type { SharingRule } from "~/domain/sharing/share-out"
import { RULE_NAMES } from "~/domain/sharing/share-words"
import { FillStrip } from "~/ui/stock/fill-strip"

type OwnSharesProps = {
	shares: readonly {
		productCode: string
		productName: string
		askedCases: number
		givenCases: number
		rule: SharingRule
		sentence: string
	}[]
}

/** What a store got of products that did not reach for all, by which rule and why. Its own figures alone. */
export function OwnShares({ shares }: OwnSharesProps) {
	if (shares.length === 0) return null
	return (
		<section className="own-shares" aria-labelledby="own-shares">
			<h2 className="head-italic" id="own-shares">
				What was short, and how it was shared
			</h2>
			<ul>
				{shares.map(({ productCode, productName, askedCases, givenCases, rule, sentence }) => (
					<li key={productCode}>
						<div>
							<span className="name">{productName}</span>
							<p>{sentence}</p>
							<p className="note">Shared out by {RULE_NAMES[rule].toLowerCase()}.</p>
						</div>
						<FillStrip
							countsThrough
							runs={[
								{ state: "promised", count: givenCases },
								{ state: "short", count: askedCases - givenCases },
							]}
							caption={`${givenCases} of ${askedCases}`}
						/>
					</li>
				))}
			</ul>
		</section>
	)
}
