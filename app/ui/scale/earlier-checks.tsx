import { Link } from "react-router"
import { EmptyLine } from "~/ui/layout/sheet"

type Check = {
	id: string
	on: string
	lotPackages: number
	sample: number
	average: string
	tooShort: number
	hasPassed: boolean
	who: string | null
}

/** The checks that were made of a lot, the latest first, each with what came of it. */
export function EarlierChecks({
	checks,
	base,
	nextHref,
}: {
	checks: readonly Check[]
	base: string
	nextHref: string | null
}) {
	if (checks.length === 0) return <EmptyLine>This lot has not been weighed yet.</EmptyLine>
	return (
		<section aria-labelledby="earlier-checks">
			<h2 className="head-italic px-4 pt-6 pb-1 desk:px-8" id="earlier-checks">
				Earlier checks of this lot
			</h2>
			<div className="clear-of-margin">
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Weighed</th>
							<th scope="col">Came to</th>
							<th scope="col" className="num max-desk:hidden">
								Sample
							</th>
							<th scope="col" className="num">
								Average error
							</th>
							<th scope="col" className="max-desk:hidden pl-4!">
								Who
							</th>
						</tr>
					</thead>
					<tbody>
						{checks.map((check) => (
							<tr key={check.id}>
								<td>
									<Link className="inline-block py-1" to={`${base}/${check.id}`}>
										{check.on}
									</Link>
								</td>
								<td>
									{check.hasPassed ? "Passed" : <span className="short">Failed</span>}
									{check.tooShort > 0 && `, ${check.tooShort} too short`}
								</td>
								<td className="num max-desk:hidden">
									{check.sample} of {check.lotPackages}
								</td>
								<td className="num fig">{check.average}</td>
								<td className="max-desk:hidden pl-4!">{check.who ?? "by itself"}</td>
							</tr>
						))}
					</tbody>
				</table>
			</div>
			{nextHref && (
				<p className="px-4 py-3 desk:px-8">
					<Link className="inline-block py-1" to={nextHref}>
						Earlier checks
					</Link>
				</p>
			)}
		</section>
	)
}
