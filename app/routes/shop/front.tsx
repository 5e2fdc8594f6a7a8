import { dayWords, monthDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { marketHours } from "~/domain/stall/market-hours"
import { findShopFront } from "~/services/shop/find-shop-front.server"
import { EmptyLine } from "~/ui/layout/sheet"
import { ShopFrame, ShopSpread } from "~/ui/layout/shop-frame"
import { ART_OF_FORM } from "~/ui/shop/art-of-form"
import { CombShelf } from "~/ui/shop/comb-shelf"
import { DayTabs } from "~/ui/shop/day-tabs"
import { EatingComb } from "~/ui/shop/eating-comb"
import { HONEY_NAMES } from "~/ui/shop/honey-dot"
import { ShopClose } from "~/ui/shop/shop-close"
import { ShopRow } from "~/ui/shop/shop-row"
import { FillStrip } from "~/ui/stock/fill-strip"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/front"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `${loaderData?.yardName ?? "Shop"}: comb honey` },
	{ name: "description", content: loaderData?.front.words ?? "" },
]

/** The same for everyone, so that a rendered copy can serve all: nothing here depends on who asks. */
export const loader = guard(admits.visitor, async ({ url }: Route.LoaderArgs, { producer }) => {
	const front = await findShopFront({ producer, dayId: url.searchParams.get("day") })
	return { slug: producer.slug, yardName: producer.name, county: producer.county, front }
})

/** The public shop: what is in season, and what is left for each market day. */
export default function ShopFrontPage({ loaderData }: Route.ComponentProps) {
	const { slug, yardName, county, front } = loaderData
	const home = `/shop/${slug}`
	return (
		<ShopFrame
			yardName={yardName}
			place={county}
			homeHref={home}
			nav={[
				{ to: home, label: "This week", current: true },
				{ to: `/buy/${slug}`, label: "For stores" },
			]}
			foot={
				<span>
					{[front.contact.address, front.contact.phone].filter(Boolean).join(". ")}{" "}
					<a href={`mailto:${front.contact.email}`}>{front.contact.email}</a>
				</span>
			}
		>
			<ShopSpread
				verso={
					<>
						<div>
							<h1 className="shop-display">{front.headline || yardName}</h1>
							<p className="shop-lead">{front.words}</p>
						</div>
						<EatingComb />
					</>
				}
			>
				<CombShelf items={front.items} />
				{front.days.length > 0 ? (
					<DayTabs
						label="At market"
						tabs={front.days.map((day) => ({
							to: `${home}?day=${day.id}`,
							title: dayWords(day.on),
							detail: `${day.marketName}, ${marketHours(day)}`,
							current: day.id === front.chosen?.id,
						}))}
					/>
				) : (
					<p className="shop-lead">No market day is set for the next two weeks.</p>
				)}
				{front.items.length === 0 ? (
					<EmptyLine>
						Nothing is in season just now. Comb comes off the hives in summer; write or call to ask when.
					</EmptyLine>
				) : (
					<ul>
						{front.items.map((item) => (
							<ShopRow
								key={item.productId}
								no={item.code}
								name={item.name}
								detail={item.detail}
								honey={{ tone: item.colour, name: HONEY_NAMES[item.colour] }}
								picture={ART_OF_FORM[item.form].src}
								price={formatMoney(item.pieceCents)}
								stock={<StockLeft item={item} />}
							/>
						))}
					</ul>
				)}
				{front.items.length > 0 && (
					<ShopClose hasMore={front.items.some(({ left, nextOn }) => left === 0 && nextOn !== null)}>
						<WhereToBuy chosen={front.chosen} />
					</ShopClose>
				)}
			</ShopSpread>
		</ShopFrame>
	)
}

type Item = Route.ComponentProps["loaderData"]["front"]["items"][number]

function StockLeft({ item }: { item: Item }) {
	const { left, kept, nextOn, nextPieces } = item
	if (left > 0) {
		const words = kept === left ? `${left} left` : `${left} of ${kept} left`
		return (
			<FillStrip
				runs={[
					{ state: "free", count: left },
					{ state: "promised", count: kept - left },
				]}
				label={words}
				caption={words}
			/>
		)
	}
	if (nextOn) {
		const words = `none left for this day; ${piecesWords(nextPieces)} from ${monthDay(nextOn)}`
		return <FillStrip runs={[{ state: "expected", count: nextPieces }]} label={words} caption={words} />
	}
	const words = kept > 0 ? "none left" : "none for this day"
	return <FillStrip runs={[{ state: "promised", count: kept }]} label={words} caption={words} />
}

type Front = Route.ComponentProps["loaderData"]["front"]

function WhereToBuy({ chosen }: Pick<Front, "chosen">) {
	if (!chosen) return <p>Write or call the yard for what there is.</p>
	const where = [chosen.marketName, chosen.address].filter(Boolean).join(", ")
	return (
		<>
			<p>
				<b>
					{dayWords(chosen.on)}, {marketHours(chosen)}:
				</b>{" "}
				{where}
			</p>
			<p className="note">
				{chosen.state === "open" && "The stall is open: this is what stands on its table."} Pay at the stall.
			</p>
		</>
	)
}
