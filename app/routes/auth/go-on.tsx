import { Form, Link, redirect } from "react-router"
import { dropKeptPost } from "~/services/people/drop-kept-post.server"
import { findKeptPost } from "~/services/people/find-kept-post.server"
import { keptPostCookie, noKeptPostCookie } from "~/services/people/kept-post-cookie.server"
import { safeTarget } from "~/services/people/safe-target.server"
import { Button } from "~/ui/forms/button"
import { PlainPage } from "~/ui/layout/plain-page"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/go-on"
import { settingCookies } from "./cookie-headers.server"
import { plainFields } from "./plain-fields"

export const meta: Route.MetaFunction = () => [{ title: "Go on where you were · Waxbill" }]

export const loader = guard(admits.signedIn, async ({ request }: Route.LoaderArgs, { person }) => {
	const kept = await findKeptPost(request, person.id)
	return { kept: kept && { fields: kept.fields, shown: plainFields(kept.fields), wasSent: kept.wasSent } }
})

/**
 * "Send it now" hands the very same post on to the page it was meant for (307 keeps method and body), which then decides
 * as if it had come straight there. It stays kept for its hour, so that nothing is lost should that fail.
 */
export const action = guard(admits.signedIn, async ({ request, url }: Route.ActionArgs, { person }) => {
	const kept = await findKeptPost(request, person.id)
	if (!kept) throw redirect("/sign-in/go-on")
	const path = safeTarget(kept.path) ?? "/"
	if (url.searchParams.has("leave")) {
		await dropKeptPost(kept.id)
		throw redirect(pageOf(path), { headers: settingCookies([noKeptPostCookie()]) })
	}
	const cookie = keptPostCookie({ id: kept.id, userId: person.id, wasSent: true })
	throw redirect(path, { status: 307, headers: settingCookies([cookie]) })
})

/** The page with the form: a post to an index page has `index` in its query, the page itself has not. */
function pageOf(path: string): string {
	const [pathname = "/", search] = path.split("?", 2)
	const query = new URLSearchParams(search)
	query.delete("index")
	return query.size === 0 ? pathname : `${pathname}?${query}`
}

export default function GoOn({ loaderData: { kept } }: Route.ComponentProps) {
	if (!kept) {
		return (
			<PlainPage title="Nothing is waiting" lead="What was typed is kept for an hour after you were signed out.">
				<Link className="btn primary big" to="/">
					Go to the start
				</Link>
			</PlainPage>
		)
	}
	const lead = kept.wasSent
		? "You have sent this already. Look whether it is there before you send it once more."
		: "You were signed out before this could be sent. Nothing of it is lost."
	return (
		<PlainPage title="Go on where you were" lead={lead}>
			{kept.shown.length > 0 && (
				<dl className="totals max-w-xl border-t border-ink pt-2">
					{kept.shown.map(({ label, value }, index) => (
						// biome-ignore lint/suspicious/noArrayIndexKey: a form may hold the same name and value twice
						<div className="totals-row" key={index}>
							<dt>{label}</dt>
							<dd className="min-w-0 break-words text-right whitespace-pre-wrap">{value}</dd>
						</div>
					))}
				</dl>
			)}
			<div className="mt-6 flex flex-wrap gap-3">
				{/* Without the router: only the browser itself follows a 307 with the post's body. */}
				<Form method="post" action="/sign-in/go-on?send" reloadDocument>
					{kept.fields.map(([name, value], index) => (
						// biome-ignore lint/suspicious/noArrayIndexKey: a form may hold the same name and value twice
						<input type="hidden" name={name} value={value} key={index} />
					))}
					<Button variant="primary" size="big">
						{kept.wasSent ? "Send it once more" : "Send it now"}
					</Button>
				</Form>
				<Form method="post" action="/sign-in/go-on?leave">
					<Button size="big">Leave it</Button>
				</Form>
			</div>
		</PlainPage>
	)
}
