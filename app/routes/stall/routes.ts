import { type RouteConfigEntry, route } from "@react-router/dev/routes"

export const stallRoutes: RouteConfigEntry[] = [
	route("stall/:producer", "routes/stall/days.tsx"),
	route("stall/:producer/:day", "routes/stall/sale.tsx"),
	route("stall/:producer/:day/cash", "routes/stall/cash.tsx"),
	route("stall/:producer/:day/card/:sale", "routes/stall/card.tsx"),
	route("stall/:producer/:day/totals", "routes/stall/totals.tsx"),
]
