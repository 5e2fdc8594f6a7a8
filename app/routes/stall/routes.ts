import type { RouteConfigEntry } from "@react-router/dev/routes"

export const stallRoutes: RouteConfigEntry[] = []
