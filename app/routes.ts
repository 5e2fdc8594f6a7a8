import { type RouteConfig, route } from "@react-router/dev/routes"
import { authRoutes } from "./routes/auth/routes"
import { buyRoutes } from "./routes/buy/routes"
import { deskRoutes } from "./routes/desk/routes"
import { shopRoutes } from "./routes/shop/routes"
import { stallRoutes } from "./routes/stall/routes"

/** The site map, by audience. Whom a page admits stands at its loader and action. */
export default [
	...shopRoutes,
	...buyRoutes,
	...deskRoutes,
	...stallRoutes,
	...authRoutes,
	route("webhooks/stripe", "routes/webhooks/stripe.tsx"),
	route("parts", "routes/parts.tsx"),
] satisfies RouteConfig
