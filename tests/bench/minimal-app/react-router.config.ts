import type { Config } from "@react-router/dev/config"
import product from "../../../react-router.config"

/** The smallest application of the framework: one page, built with the product's own flags. */
export default {
	future: product.future,
	routeDiscovery: product.routeDiscovery,
	buildDirectory: "../../../.waxbill/bench/build/minimal",
} satisfies Config
