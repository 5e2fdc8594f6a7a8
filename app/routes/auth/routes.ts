import { type RouteConfigEntry, route } from "@react-router/dev/routes"

export const authRoutes: RouteConfigEntry[] = [
	route("sign-in", "routes/auth/sign-in.tsx"),
	route("sign-in/code", "routes/auth/sign-in-code.tsx"),
	route("sign-in/link/:token", "routes/auth/sign-in-link.tsx"),
	route("sign-in/go-on", "routes/auth/go-on.tsx"),
	route("sign-out", "routes/auth/sign-out.tsx"),
	route("account", "routes/auth/account.tsx"),
	route("account/sessions", "routes/auth/sessions.tsx"),
	route("invitation/:token", "routes/auth/invitation.tsx"),
]
