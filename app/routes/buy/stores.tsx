import { Link, redirect } from "react-router"
import { findPlaces } from "~/services/people/find-places.server"
import { PlainPage } from "~/ui/layout/plain-page"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/stores"

export const meta: Route.MetaFunction = () => [{ title: "Your stores · Waxbill" }]

/** The stores that the person buys for at this producer; straight on where there is one. */
export const loader = guard(admits.anyBuyer, async (_args: Route.LoaderArgs, { person, producer }) => {
	const places = await findPlaces(person.id)
	const stores = places.filter((place) => place.href.startsWith(`/buy/${producer.slug}/`))
	const [only, ...others] = stores
	if (!only) throw new Response(null, { status: 404 })
	if (others.length === 0) throw redirect(only.href)
	return { producerName: producer.name, stores: stores.map(({ href, name }) => ({ href, name })) }
})

export default function Stores({ loaderData: { producerName, stores } }: Route.ComponentProps) {
	return (
		<PlainPage title="For which store?" lead={<>You order from {producerName} for more than one.</>}>
			<ul className="grid gap-2">
				{stores.map(({ href, name }) => (
					<li key={href}>
						<Link className="name inline-block py-2" to={href}>
							{name}
						</Link>
					</li>
				))}
			</ul>
		</PlainPage>
	)
}
