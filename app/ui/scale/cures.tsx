import { Link } from "react-router"
import { Notice } from "~/ui/forms/notice"

/** What cures a lot that failed. One that is held stays so until a later check passes. */
export function Cures(props: { isHeld: boolean; suggestedLabel: string | null; againHref: string }) {
	const { isHeld, suggestedLabel, againHref } = props
	const title = isHeld
		? "The lot stays held. Any of these cures it."
		: "The lot is not held any more. Sell none of it until one of these is done."
	return (
		<div className="clear-of-margin px-4 py-5 desk:px-8">
			<Notice title={title}>
				<ul className="cures">
					<li>
						<b>Relabel</b> every package with a weight that all of them reach
						{suggestedLabel ? `: ${suggestedLabel} is the next quarter ounce that this sample’s average holds` : ""}.
						Then weigh again against the new label.
					</li>
					<li>
						<b>Top up</b> what can be topped up: chunk in jars takes liquid honey, cut comb a heavier piece.
					</li>
					<li>
						<b>Sort again</b>: weigh every package, split the light ones off into a lot of their own with its own label.
					</li>
					<li>
						<Link to={againHref}>Weigh again</Link> if the scale, the unit or the tare was wrong. This check stays on
						record.
					</li>
				</ul>
			</Notice>
		</div>
	)
}
