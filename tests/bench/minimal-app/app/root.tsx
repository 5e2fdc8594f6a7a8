import { type ReactNode, use } from "react"
import { Meta, Outlet, Scripts, ScrollRestoration } from "react-router"
import { NonceContext } from "~/ui/nonce"

export function Layout({ children }: { children: ReactNode }) {
	const nonce = use(NonceContext)
	return (
		<html lang="en-US">
			<head>
				<meta charSet="utf-8" />
				<meta name="viewport" content="width=device-width, initial-scale=1" />
				<Meta />
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
