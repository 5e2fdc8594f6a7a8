import { Link } from "react-router"
import { now as askClock } from "~/platform/clock.server"
import { findSeason } from "~/services/desk/find-season.server"
import { countHead } from "~/ui/desk/number-words"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { SeasonPicture } from "~/ui/season/season-picture"
import { SeasonTable } from "~/ui/season/season-table"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/season"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { fromWords, seasonView } from "./season-view"

export const meta: Route.MetaFunction = () => [{ title: "The season ahead · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async (_args: Route.LoaderArgs, scope) => {
	const now = askClock()
	const { id, timeZone } = scope.producer
	const season = await findSeason({ producerId: id, now, zone: timeZone })
	return {
		frame: await findDeskFrame(scope, { part: "crop", now }),
		from: fromWords(season),
		products: seasonView(season),
		unreadStores: season.unreadStores,
	}
})

export default function Season({ loaderData, params }: Route.ComponentProps) {
	const { frame, from, products, unreadStores } = loaderData
	const base = `/desk/${params.producer}`
	const short = products.filter(({ sentence }) => sentence !== null).length
	const lead =
		short === 0
			? "No week is short at the low figure of the crop."
			: `${countHead(short)} ${short === 1 ? "product" : "products"} will be short at the low figure of the crop.`
	return (
		<DeskBook frame={frame} ruled>
			<SheetHead
				title="The season ahead"
				lead={products.length === 0 ? `26 weeks from ${from}.` : `26 weeks from ${from}. ${lead}`}
				note={
					<>
						Deliveries are served in turn; the reserve for stall and shop is kept. <Link to={`${base}/crop`}>Crop</Link>
						. <Link to={`${base}/figures`}>What was sold</Link>
					</>
				}
			/>
			{unreadStores.length > 0 && (
				<MessageLine
					tone="problem"
					title={`The standing ${unreadStores.length === 1 ? "order" : "orders"} of ${unreadStores.join(", ")} cannot be read.`}
				>
					Nothing is reckoned or ordered by it until the store sets it anew. Tell them.
				</MessageLine>
			)}
			{products.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/crop`}>See the crop</Link>}>
					Nothing is in stock, expected or asked for yet.
				</EmptyLine>
			) : (
				<>
					<SeasonKey />
					{products.map(({ code, name, sentence, weeks }) => (
						<section className="season-product desk:mr-[calc(var(--spacing-margin)-1px)]" key={code}>
							<h2 className="name">
								<span className="fig text-ink-faint">{code}</span> {name}
							</h2>
							<p>
								{sentence ? <span className="short">{sentence}</span> : "Covered in every week, at the low figure too."}
							</p>
							<SeasonPicture name={`${code} ${name}`} weeks={weeks} />
							<SeasonTable name={`${code} ${name}`} weeks={weeks} />
						</section>
					))}
					<p className="px-4 py-4 desk:px-8">
						<a href={`${base}/season.csv`} download>
							All weeks as a CSV file
						</a>
					</p>
				</>
			)}
		</DeskBook>
	)
}

function SeasonKey() {
	const keys = [
		["season-bar commitment", "commitments"],
		["season-bar", "standing orders"],
		["season-bar single", "single orders"],
		["season-short", "short at the low figure"],
		["season-range", "there, from the low figure (line) to the high"],
	] as const
	return (
		<p className="season-key note">
			{keys.map(([shape, words]) => (
				<span key={words}>
					<svg width="14" height="14" viewBox="0 0 14 14" aria-hidden="true">
						<path className={shape} d="M1.5 1.5h11v11h-11z" />
					</svg>
					{words}
				</span>
			))}
			<span>in cases</span>
		</p>
	)
}
