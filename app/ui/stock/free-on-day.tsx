import { Link } from "react-router"
import type { Day } from "~/domain/calendar"
import { stripWords } from "~/ui/orders/strip-words"
import { FillStrip } from "./fill-strip"

type Strip = Parameters<typeof stripWords>[0]["strip"]
type FreeOnDayProps = {
	products: readonly { code: string; name: string; detail: string; strip: Strip }[]
	today: Day
	/** Where the figure of a product is explained. */
	whyHref: (code: string) => string
}

/** What can still be promised for a day, product by product, each with the way to why. */
export function FreeOnDay({ products, today, whyHref }: FreeOnDayProps) {
	if (products.length === 0) return null
	return (
		<table className="sheet-table mt-6">
			<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">
				Free to promise for that day, in cases
			</caption>
			<thead>
				<tr>
					<th scope="col">Product</th>
					<th scope="col">Free</th>
					<th scope="col" className="pr-4! desk:pr-8!">
						<span className="sr-only">Why</span>
					</th>
				</tr>
			</thead>
			<tbody>
				{products.map(({ code, name, detail, strip }) => (
					<tr key={code}>
						<td>
							<span className="fig text-ink-faint">{code}</span> {name}
							<span className="note block">{detail}</span>
						</td>
						<td>
							<FillStrip
								size="sm"
								runs={[
									{ state: "free", count: strip.free },
									{ state: "held", count: strip.held },
									{ state: "expected", count: strip.expected },
								]}
								caption={stripWords({ strip, toShareCases: 0 }, today)}
							/>
						</td>
						<td className="pr-4! desk:pr-8!">
							<Link className="inline-block py-1" to={whyHref(code)} aria-label={`Why so many of ${name}`}>
								Why
							</Link>
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}
