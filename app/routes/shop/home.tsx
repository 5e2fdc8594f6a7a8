import { Link } from "react-router"
import { findPlaces } from "~/services/people/find-places.server"
import { ButtonLink } from "~/ui/forms/button"
import { FrontDoor } from "~/ui/shop/front-door"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/home"

export const meta: Route.MetaFunction = () => [
	{ title: "Waxbill, the order desk for comb honey" },
	{ name: "description", content: "Standing orders, a fair share of a short crop, invoices and the market stall." },
]

export const loader = guard(admits.anyone, async (_args: Route.LoaderArgs, { person }) => ({
	places: person ? await findPlaces(person.id) : [],
	personName: person?.name ?? null,
}))

/** The front door: what Waxbill is for; and for those who are signed in, where they are at home. */
export default function Home({ loaderData }: Route.ComponentProps) {
	const { places, personName } = loaderData
	return (
		<FrontDoor
			title="The order desk for comb honey"
			lead="Comb comes off the hives for a few weeks and breaks if it is dropped. Stores, market stall and shop all buy from one short crop here, and nothing is promised that will not come off."
		>
			{personName ? (
				<div className="front-ways">
					<h2 className="head-italic">{personName}, you are at home here</h2>
					{places.length === 0 ? (
						<p>At no desk, stall or store yet. An invitation by e-mail, or a desk of your own, opens one.</p>
					) : (
						<nav className="front-places" aria-label="Your places">
							{places.map((place) => (
								<Link key={place.href} to={place.href}>
									{place.name}
								</Link>
							))}
						</nav>
					)}
					<p className="flex flex-wrap gap-4">
						<ButtonLink to="/open-a-desk">Open a desk for your yard</ButtonLink>
						<ButtonLink to="/account" variant="plain">
							Your account
						</ButtonLink>
					</p>
				</div>
			) : (
				<p className="front-ways flex flex-wrap gap-4">
					<ButtonLink to="/sign-in" variant="primary" size="big">
						Sign in
					</ButtonLink>
					<ButtonLink to="/open-a-desk" size="big">
						Open a desk for your yard
					</ButtonLink>
				</p>
			)}
		</FrontDoor>
	)
}
