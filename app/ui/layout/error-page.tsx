import { isRouteErrorResponse, useLocation } from "react-router"
import { PlainPage } from "./plain-page"

type Words = { title: string; lead: string; canTryAgain: boolean }

const NOT_FOUND: Words = {
	title: "There is nothing here",
	lead: "The address may be mistyped, or the page may have gone.",
	canTryAgain: false,
}
const BROKEN: Words = {
	title: "This page could not be made",
	lead: "The fault is ours. Nothing that was saved before is lost. If you had just sent something, look whether it is there before you send it again.",
	canTryAgain: true,
}
const BY_STATUS: Record<number, Words> = {
	400: {
		title: "That could not be read",
		lead: "Something in the request was not as it should be. Nothing was changed.",
		canTryAgain: true,
	},
	403: {
		title: "This page is not yours to open",
		lead: "You may be signed in as someone else, or your part in it may have ended. Nothing was changed.",
		canTryAgain: false,
	},
	404: NOT_FOUND,
	405: NOT_FOUND,
	413: {
		title: "That was too large to send",
		lead: "Nothing was taken. Go back and send less, or a smaller file.",
		canTryAgain: false,
	},
	429: {
		title: "That was too often",
		lead: "Nothing was changed. Wait a few minutes, then try once more.",
		canTryAgain: true,
	},
	503: {
		title: "Waxbill cannot answer just now",
		lead: "Nothing was changed and nothing was sent. It comes back by itself; try again in a minute.",
		canTryAgain: true,
	},
}

/**
 * What went wrong, in plain words and with no internals. Knows answers thrown by routes by their status; all else is our
 * fault. The stack shows in development alone.
 */
export function ErrorPage({ error }: { error: unknown }) {
	const { pathname, search } = useLocation()
	const words = isRouteErrorResponse(error) ? (BY_STATUS[error.status] ?? BROKEN) : BROKEN
	return (
		<PlainPage title={words.title} lead={words.lead}>
			<title>{`${words.title} · Waxbill`}</title>
			<p className="flex flex-wrap gap-3">
				{/* A plain link, not a client navigation: it also fetches the current scripts after a release. */}
				{words.canTryAgain && (
					<a className="btn primary big" href={`${pathname}${search}`}>
						Load this page again
					</a>
				)}
				<a className="btn big" href="/">
					Go to the start
				</a>
			</p>
			{import.meta.env.DEV && error instanceof Error && (
				<pre className="mt-6 overflow-x-auto text-note">{error.stack}</pre>
			)}
		</PlainPage>
	)
}
