import { Link } from "react-router"
import { findPlaces } from "~/services/people/find-places.server"
import { ButtonLink } from "~/ui/forms/button"
import { PlainPage } from "~/ui/layout/plain-page"
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
		<PlainPage
			title="The order desk for comb honey"
			lead="Stores order by the case for their delivery day, the yard promises only what comes off the hives, and the stall sells the rest by the piece."
		>
			{personName ? (
				<>
					<h2 className="head-italic">{personName}, you are at home here</h2>
					{places.length === 0 ? (
						<p className="mt-2">
							At no desk, stall or store yet. An invitation by e-mail, or a desk of your own, opens one.
						</p>
					) : (
						<nav className="front-places" aria-label="Your places">
							{places.map((place) => (
								<Link key={place.href} to={place.href}>
									{place.name}
								</Link>
							))}
						</nav>
					)}
					<p className="mt-6 flex flex-wrap gap-4">
						<ButtonLink to="/open-a-desk">Open a desk for your yard</ButtonLink>
						<ButtonLink to="/account" variant="plain">
							Your account
						</ButtonLink>
					</p>
				</>
			) : (
				<p className="flex flex-wrap gap-4">
					<ButtonLink to="/sign-in" variant="primary" size="big">
						Sign in
					</ButtonLink>
					<ButtonLink to="/open-a-desk" size="big">
						Open a desk for your yard
					</ButtonLink>
				</p>
			)}
		</PlainPage>
	)
}
