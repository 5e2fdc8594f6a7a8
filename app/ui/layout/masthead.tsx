import { Form, Link } from "react-router"
import { Mark } from "~/ui/icons"

export type Account = { name: string; href?: string; signOutAction: string }

export type MastheadProps = {
	homeHref: string
	/** Whose book this is: a producer or a store. */
	who: string
	/** A few words after the name, such as "ordering from Larkmoor Bee Yard". */
	place?: string
	/** The moment the page was made, in words: "Thursday, August 13, 6:40 pm". */
	now?: string
	person?: Account
}

/** The waxbill and its name, the way home. */
export function Brand({ to }: { to: string }) {
	return (
		<Link className="brand" to={to}>
			<Mark />
			<span>Waxbill</span>
		</Link>
	)
}

/** Signing out changes something, so it is a form and not a link. */
export function SignOut({ action }: { action: string }) {
	return (
		<Form method="post" action={action}>
			<button type="submit">Sign out</button>
		</Form>
	)
}

/** The top of the band. Below 1024 the date goes and the person moves under More. */
export function Masthead({ homeHref, who, place, now, person }: MastheadProps) {
	return (
		<header className="mast">
			<Brand to={homeHref} />
			<span className="mast-who">{who}</span>
			{place && <span className="mast-place">{place}</span>}
			<div className="mast-right">
				{now && <span>{now}</span>}
				{person && (person.href ? <Link to={person.href}>{person.name}</Link> : <span>{person.name}</span>)}
				{person && <SignOut action={person.signOutAction} />}
			</div>
		</header>
	)
}
