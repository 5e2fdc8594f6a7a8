import sansUrl from "@fontsource-variable/source-sans-3/files/source-sans-3-latin-wght-normal.woff2?url"
import serifUrl from "@fontsource-variable/source-serif-4/files/source-serif-4-latin-opsz-normal.woff2?url"
import { type ReactNode, use } from "react"
import { Links, Meta, Outlet, Scripts, ScrollRestoration } from "react-router"
import type { Route } from "./+types/root"
import styles from "./app.css?url"
import { nothingGuarded } from "./routes/guard.server"
import { useHydrated } from "./ui/hydrated"
import { ErrorPage } from "./ui/layout/error-page"
import { NonceContext } from "./ui/nonce"

const preloadedFont = (href: string) =>
	({ rel: "preload", as: "font", type: "font/woff2", crossOrigin: "anonymous", href }) as const

export const links: Route.LinksFunction = () => [
	preloadedFont(serifUrl),
	preloadedFont(sansUrl),
	{ rel: "stylesheet", href: styles },
	{ rel: "icon", href: "/favicon.svg", type: "image/svg+xml" },
]

/** For pages that give themselves no title; an error page brings its own. */
export const meta: Route.MetaFunction = ({ error }) => (error ? [] : [{ title: "Waxbill" }])

/** Middleware runs for a client navigation only where a loader does, so the root has one. */
export const loader = nothingGuarded

/** The document around every page, also around the pages that say what went wrong. */
export function Layout({ children }: { children: ReactNode }) {
	const nonce = use(NonceContext)
	useHydrated()
	return (
		<html lang="en-US">
			<head>
				<meta charSet="utf-8" />
				<meta name="viewport" content="width=device-width, initial-scale=1" />
				<meta name="color-scheme" content="light" />
				<Meta />
				<Links />
			</head>
			<body>
				{children}
				<ScrollRestoration nonce={nonce} />
				<Scripts nonce={nonce} />
			</body>
		</html>
	)
}

export default function Root() {
	return <Outlet />
}

export function ErrorBoundary({ error }: Route.ErrorBoundaryProps) {
	return <ErrorPage error={error} />
}
