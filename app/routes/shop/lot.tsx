import { data } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { colourByPfund } from "~/domain/grading/colour"
import { findPublicLot } from "~/services/trace/find-public-lot.server"
import { ShopFrame, ShopSpread } from "~/ui/layout/shop-frame"
import { EatingComb } from "~/ui/shop/eating-comb"
import { HONEY_NAMES, HoneyDot } from "~/ui/shop/honey-dot"
import { FactList } from "~/ui/trace/lot-facts"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/lot"

export const meta: Route.MetaFunction = ({ loaderData, params }) => [
	{ title: `Lot ${params.code}, ${loaderData?.yardName ?? "comb honey"}` },
]

/** The same for everyone, so that a rendered copy can serve all: nothing here depends on who asks. */
export const loader = guard(admits.visitor, async ({ params }: Route.LoaderArgs, { producer }) => {
	const lot = await findPublicLot({ producerId: producer.id, code: params.code })
	if (!lot) throw data(null, { status: 404 })
	const { withdrawal, ...facts } = lot
	return {
		slug: producer.slug,
		yardName: producer.name,
		county: producer.county,
		lot: facts,
		withdrawal: withdrawal && {
			reason: withdrawal.reason,
			instructions: withdrawal.instructions,
			on: fullDay(dayInZone(withdrawal.startedAt, producer.timeZone)),
		},
	}
})

/** The page of the lot that someone holds a piece of. It never tells who bought of it. */
export default function PublicLot({ loaderData }: Route.ComponentProps) {
	const { slug, yardName, county, lot, withdrawal } = loaderData
	const home = `/shop/${slug}`
	const { address, email, phone } = lot.contact
	const place = [lot.yard, county].filter(Boolean).join(", ")
	return (
		<ShopFrame
			yardName={yardName}
			place={county}
			homeHref={home}
			nav={[
				{ to: home, label: "This week" },
				{ to: `/buy/${slug}`, label: "For stores" },
			]}
			foot={
				<span>
					{[address, phone].filter(Boolean).join(". ")} <a href={`mailto:${email}`}>{email}</a>
				</span>
			}
		>
			<ShopSpread
				verso={
					<>
						<div>
							<h1 className="shop-display">Lot {lot.code}</h1>
							<p className="shop-lead">
								{lot.productName}, {lot.detail}. It came off the hives on {fullDay(lot.harvestedOn)}
								{place && `, at ${place}`}.
							</p>
						</div>
						<EatingComb />
					</>
				}
			>
				<div className="public-lot">
					{withdrawal && (
						<section className="call-back" aria-labelledby="called-back">
							<h2 className="name short" id="called-back">
								This lot is called back. Please do not eat it.
							</h2>
							<p>
								Since {withdrawal.on}. {withdrawal.reason}
							</p>
							<p>{withdrawal.instructions}</p>
							<p>
								If you hold a piece, keep it apart and write to <a href={`mailto:${email}`}>{email}</a>
								{phone && ` or call ${phone}`}.
							</p>
						</section>
					)}
					{lot.state === "held" && (
						<p>This lot is not for sale yet: it has still to be frozen, weighed and released.</p>
					)}
					<section aria-labelledby="what-it-is">
						<h2 className="head-italic" id="what-it-is">
							What you hold
						</h2>
						<FactList
							facts={[
								{ name: "Comb", fact: `${lot.productName}, ${lot.detail}` },
								{ name: "Off the hives", fact: fullDay(lot.harvestedOn) },
								{ name: "Where", fact: place },
								{ name: "Flowers", fact: lot.flora },
								{
									name: "Colour",
									fact: (
										<>
											{lot.pfundTenths === null ? "" : colourByPfund(lot.pfundTenths)}
											<HoneyDot tone={lot.colour} name={HONEY_NAMES[lot.colour]} />
										</>
									),
								},
								{ name: "Grade", fact: lot.grade },
								{ name: "Best before", fact: fullDay(lot.bestBeforeOn) },
							]}
						/>
					</section>
					<section aria-labelledby="take-care">
						<h2 className="head-italic" id="take-care">
							Take care
						</h2>
						<p>
							Honey must not be given to infants under one year. Comb can carry pollen and traces of propolis: who has
							an allergy to bees, pollen or propolis should ask a doctor first. Keep it cool, dry and covered.
						</p>
					</section>
				</div>
			</ShopSpread>
		</ShopFrame>
	)
}
