import type { Config } from "@react-router/dev/config"

export default {
	future: {
		v8_middleware: true,
		v8_splitRouteModules: true,
		v8_viteEnvironmentApi: true,
		v8_passThroughRequests: true,
		v8_trailingSlashAwareDataRequests: true,
	},
	// Old tabs must find their routes after a deploy, so the whole map goes out with the first page.
	routeDiscovery: { mode: "initial" },
} satisfies Config
