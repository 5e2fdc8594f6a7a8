import { dayWords, monthDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { findShopFront } from "~/services/shop/find-shop-front.server"
import { EmptyLine } from "~/ui/layout/sheet"
import { ShopFrame, ShopSpread } from "~/ui/layout/shop-frame"
import { ART_OF_FORM } from "~/ui/shop/art-of-form"
import { CombShelf } from "~/ui/shop/comb-shelf"
import { DayTabs } from "~/ui/shop/day-tabs"
import { EatingComb } from "~/ui/shop/eating-comb"
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

const HONEY_NAMES = { straw: "light straw", light: "light amber", amber: "amber", dark: "dark amber" }

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
							detail: `${day.marketName}, ${hours(day)}`,
							current: day.on === front.chosenOn,
						}))}
					/>
				) : (
					<p className="shop-lead">No market day is set for the next two weeks. Write or call for what there is.</p>
				)}
				{front.items.length === 0 ? (
					<EmptyLine>Nothing is in season just now. Comb comes off the hives in summer.</EmptyLine>
				) : (
					<ul className="shop-rows">
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
								field={
									<span className="note">
										{item.left > 0 ? "at the stall" : item.nextOn ? "not yet" : "none for this day"}
									</span>
								}
							/>
						))}
					</ul>
				)}
			</ShopSpread>
		</ShopFrame>
	)
}

type Item = Route.ComponentProps["loaderData"]["front"]["items"][number]

function StockLeft({ item }: { item: Item }) {
	if (item.left === 0 && item.nextOn) {
		const words = item.nextPieces > 0 ? `${item.nextPieces} more` : "more"
		return (
			<FillStrip
				runs={[{ state: "expected", count: item.nextPieces }]}
				caption={`none left for this day; ${words} from ${monthDay(item.nextOn)}`}
			/>
		)
	}
	return (
		<FillStrip
			runs={[
				{ state: "free", count: item.left },
				{ state: "promised", count: Math.max(0, item.kept - item.left) },
			]}
			caption={item.kept === item.left ? `${item.left} left` : `${item.left} of ${item.kept} left`}
		/>
	)
}

function hours({ opensAt, closesAt }: { opensAt: string; closesAt: string }): string {
	return `${clock(opensAt)} to ${clock(closesAt)}`
}

/** "09:00:00" → "9", "13:30:00" → "1:30". */
function clock(time: string): string {
	const [hour = 0, minute = 0] = time.split(":").map(Number)
	const twelve = hour % 12 || 12
	return minute === 0 ? String(twelve) : `${twelve}:${String(minute).padStart(2, "0")}`
}
