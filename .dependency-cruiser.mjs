/**
 * The direction in which one folder may import another. Each rule says in its comment where the code belongs instead.
 * `npm run check:imports` runs it; tests/structure/import-rules.test.ts plants one breach of each and expects it found.
 */

/** Pure libraries that rules may use. */
const PURE_LIBRARIES = "^node_modules/(dinero\\.js|temporal-polyfill|rrule-temporal)/"

const never = (name, from, to, comment) => ({ name, severity: "error", comment, from, to })

export default {
	forbidden: [
		never(
			"domain-is-pure",
			{ path: "^app/domain/" },
			{ pathNot: ["^app/domain/", PURE_LIBRARIES] },
			"A rule is given its facts: load them in a service and pass them in.",
		),
		never(
			"domain-reaches-no-database",
			{ path: "^app/domain/" },
			{ path: "^app/(db|platform|services)/", reachable: true },
			"Not through a third file either.",
		),
		never(
			"db-knows-no-use-case",
			{ path: "^app/db/" },
			{ path: "^(app/(services|routes|jobs|ui)|emails|fakes|tests)/" },
			"Tables and transactions serve the services; what decides belongs in app/services.",
		),
		never(
			"platform-knows-no-use-case",
			{ path: "^app/platform/" },
			{ path: "^(app/(services|routes|jobs|ui)|emails|fakes|tests)/" },
			"An adapter does not know what it is used for; compose it in a service.",
		),
		never(
			"services-know-no-edge",
			{ path: "^app/services/" },
			{ path: ["^(app/(routes|jobs|ui)|fakes|tests)/", "^node_modules/react-router/"] },
			"A use case answers plain data; the route or job translates it.",
		),
		never(
			"routes-call-services",
			{ path: "^app/routes/" },
			{ path: ["^app/(db|jobs)/", "^node_modules/(drizzle-orm|pg|stripe)/", "^(fakes|tests)/"] },
			"A route parses, calls one service and answers; queries belong in app/services.",
		),
		never(
			"jobs-call-services",
			{ path: "^app/jobs/" },
			{ path: "^(app/(routes|ui)|fakes|tests)/" },
			"A job parses its payload and calls one service.",
		),
		never(
			"ui-knows-no-server",
			{ path: "^app/ui/" },
			{ path: ["\\.server\\.tsx?$", "^app/(db|platform|services|routes|jobs)/", "^(fakes|tests)/"] },
			"A component gets props; the route's loader gets the data.",
		),
		never(
			"emails-know-domain-only",
			{ path: "^emails/" },
			{ path: ["^app/(?!domain/)", "^(fakes|tests)/"] },
			"A template gets props and answers markup.",
		),
		never("nothing-circular", {}, { circular: true }, "Take the shared part out into a file that both import."),
		never(
			"everything-resolves",
			{},
			{ couldNotResolve: true },
			"The import names nothing that is installed or written.",
		),
	],
	options: {
		doNotFollow: { path: "node_modules" },
		exclude: { path: ["^build/", "\\+types/", "^\\.react-router/"] },
		tsPreCompilationDeps: true,
		tsConfig: { fileName: "tsconfig.json" },
		enhancedResolveOptions: { exportsFields: ["exports"], conditionNames: ["import", "node", "default", "types"] },
	},
}
