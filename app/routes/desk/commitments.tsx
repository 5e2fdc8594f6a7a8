import { data, Form, Link, redirect } from "react-router"
import { cadenceOf, cadenceWords } from "~/domain/standing-orders/cadence"
import { now } from "~/platform/clock.server"
import { findStandingYear } from "~/services/standing-orders/find-standing-year.server"
import { findStoreBySlug } from "~/services/standing-orders/find-store-by-slug.server"
import { setCommitment } from "~/services/standing-orders/set-commitment.server"
import { Button } from "~/ui/forms/button"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { SeasonTotals } from "~/ui/standing-orders/season-totals"
import { YearTable, yearRow } from "~/ui/standing-orders/year-table"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/commitments"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Standing order of a store · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const store = await findStoreBySlug({ producerId: producer.id, slug: params.store })
	if (!store) throw data(null, { status: 404 })
	const year = await findStandingYear({
		producerId: producer.id,
		storeId: store.id,
		now: now(),
		zone: producer.timeZone,
	})
	const cadence = year.standing ? cadenceOf(year.standing.rule) : null
	return {
		frame: await findDeskFrame(scope, { part: "stores" }),
		storeName: store.name,
		hasStanding: year.standing !== null,
		isCommitment: year.standing?.isCommitment ?? false,
		cadence: cadence && cadenceWords(cadence),
		season: year.season,
		rows: year.dates.map((date) => yearRow(date, year)),
	}
})

export const action = guard(admits.desk("owner"), async ({ params, request, url }: Route.ActionArgs, scope) => {
	const store = await findStoreBySlug({ producerId: scope.producer.id, slug: params.store })
	if (!store) throw data(null, { status: 404 })
	const form = await request.formData()
	await setCommitment({
		producerId: scope.producer.id,
		storeId: store.id,
		personId: scope.person.id,
		isCommitment: form.get("isCommitment") === "yes",
		now: now(),
	})
	throw redirect(url.pathname)
})

export default function StoreStanding({ loaderData }: Route.ComponentProps) {
	const { storeName, hasStanding, isCommitment, cadence, rows, season } = loaderData
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={storeName}
				lead={
					hasStanding
						? `A standing order, ${cadence ?? "by its own rule"}. The store sets it; you read it here.`
						: undefined
				}
				action={
					<Link className="btn" to="../.." relative="path">
						All stores
					</Link>
				}
			/>
			{hasStanding ? (
				<>
					<Form method="post" className="flex flex-wrap items-center gap-x-6 gap-y-3 px-4 py-4 desk:px-8">
						<p>
							{isCommitment
								? "Committed for the season: served first when the crop is short."
								: "Not committed for the season: shares with the other standing orders when the crop is short."}
						</p>
						<Button name="isCommitment" value={isCommitment ? "no" : "yes"}>
							{isCommitment ? "Take it as an ordinary standing order" : "Count it as committed"}
						</Button>
					</Form>
					<SeasonTotals season={season} />
					<YearTable rows={rows} />
				</>
			) : (
				<>
					<EmptyLine>{storeName} has no standing order.</EmptyLine>
					<SeasonTotals season={season} />
				</>
			)}
		</DeskBook>
	)
}
