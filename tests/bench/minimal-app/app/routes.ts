import { index, type RouteConfig, route } from "@react-router/dev/routes"

export default [index("page.tsx"), route("buy/:producer/:store/sheet/:day", "reading-page.tsx")] satisfies RouteConfig
