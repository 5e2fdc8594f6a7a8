import { Link } from "react-router"
import { wholePercent } from "~/domain/figures/shares"
import { formatMoney } from "~/domain/money"
import { MarginNote } from "~/ui/layout/sheet"
import { FigurePart } from "./figure-part"
import { PartBars } from "./part-bars"

type Share = { year: number; consumerCents: number; otherCents: number; isRetail: boolean }

/** How a year's money divides between the public and stores, with what it may mean and who decides. */
export function SharePart({ share, recordsHref }: { share: Share; recordsHref: string }) {
	const { year, consumerCents, otherCents, isRetail } = share
	const all = consumerCents + otherCents
	const percent = wholePercent(consumerCents, all)
	const words = `${formatMoney(consumerCents)} to the public, ${formatMoney(otherCents)} to stores`
	return (
		<FigurePart id="share" title={`The public’s part of ${year}`}>
			{percent === null ? (
				<p className="figure-lead">Nothing was sold in {year}.</p>
			) : (
				<>
					<PartBars
						label="Sales to the public and to stores"
						isWordy
						bars={[
							{
								key: "share",
								name: `${percent} % to the public`,
								parts: [
									{ fill: "money-out", amount: consumerCents },
									{ fill: "money-in", amount: otherCents },
								],
								words,
								label: words,
							},
						]}
					/>
					<p className="figure-lead">
						{isRetail
							? "More to the public than to all others: a year like this is that of a retail food establishment, which, like a farm, need not register as a food facility."
							: "Not more to the public than to all others: a year like this is not that of a retail food establishment. A farm need not register as a food facility; others may have to."}{" "}
						Source: 21 CFR 1.226 and 1.227. <Link to={recordsHref}>Records for an inspector</Link>
					</p>
				</>
			)}
			<div className="figure-lead">
				<MarginNote>Local rules decide, and this is no legal advice. Ask your authority.</MarginNote>
			</div>
		</FigurePart>
	)
}
