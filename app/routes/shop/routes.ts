import { index, type RouteConfigEntry, route } from "@react-router/dev/routes"

export const shopRoutes: RouteConfigEntry[] = [
	index("routes/shop/home.tsx"),
	route("open-a-desk", "routes/shop/open-a-desk.tsx"),
	route("shop/:producer", "routes/shop/front.tsx"),
	route("shop/:producer/lots/:code", "routes/shop/lot.tsx"),
	route("shop/:producer/notices/:token", "routes/shop/notice.tsx"),
]
