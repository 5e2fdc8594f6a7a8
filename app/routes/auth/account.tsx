import { Form, Link } from "react-router"
import { findPlaces } from "~/services/people/find-places.server"
import { Button } from "~/ui/forms/button"
import { PlainPage } from "~/ui/layout/plain-page"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/account"

export const meta: Route.MetaFunction = () => [{ title: "Your account · Waxbill" }]

export const loader = guard(admits.signedIn, async (_args: Route.LoaderArgs, { person }) => ({
	name: person.name,
	email: person.email,
	places: (await findPlaces(person.id)).map(({ href, name }) => ({ href, name })),
}))

export default function Account({ loaderData: { name, email, places } }: Route.ComponentProps) {
	return (
		<PlainPage title={name} lead={<>Signed in as {email}</>}>
			<h2 className="name">Where you are at home</h2>
			{places.length === 0 ? (
				<p className="mt-2">Nowhere yet. A producer invites you by e-mail; the link in that letter opens the door.</p>
			) : (
				<ul className="mt-2 grid gap-1">
					{places.map((place) => (
						<li key={place.href}>
							<Link className="inline-block py-1 underline underline-offset-4" to={place.href}>
								{place.name}
							</Link>
						</li>
					))}
				</ul>
			)}
			<div className="mt-6 flex flex-wrap gap-3">
				<Link className="btn" to="/account/sessions">
					Where you are signed in
				</Link>
				<Form method="post" action="/sign-out">
					<Button>Sign out</Button>
				</Form>
			</div>
		</PlainPage>
	)
}
