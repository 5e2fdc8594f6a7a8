import type { ComponentProps } from "react"
import { renderToString } from "react-dom/server"
import { createStaticHandler, createStaticRouter, StaticRouterProvider } from "react-router"
import Sheet, { meta } from "~/routes/buy/sheet"
import type { SheetData } from "./sheet-of"

type Page = { path: string; params: { producer: string; store: string; day: string } }

/** The page's links and forms ask for a router around them; this one holds a single route and loads nothing. */
const { dataRoutes } = createStaticHandler([{ id: "sheet", path: "/buy/:producer/:store/sheet/:day", element: null }])

/** The document of the order sheet, the product's own components in it, and their data for the browser's script. */
export function renderSheet(loaderData: SheetData, page: Page): string {
	const html = renderToString(<Document loaderData={loaderData} page={page} />)
	return `<!DOCTYPE html>${html}`
}

function Document({ loaderData, page }: { loaderData: SheetData; page: Page }) {
	const data = JSON.stringify(loaderData).replaceAll("<", "\\u003c")
	return (
		<html lang="en-US">
			<head>
				<meta charSet="utf-8" />
				<meta name="viewport" content="width=device-width, initial-scale=1" />
				<title>{titleOf(loaderData)}</title>
			</head>
			<body>
				<InRouter page={page} props={{ loaderData, params: page.params } as ComponentProps<typeof Sheet>} />
				{/** biome-ignore lint/security/noDangerouslySetInnerHtml: JSON in which no tag can begin */}
				<script dangerouslySetInnerHTML={{ __html: `window.page=${data}` }} />
			</body>
		</html>
	)
}

function InRouter({ page, props }: { page: Page; props: ComponentProps<typeof Sheet> }) {
	const [route] = dataRoutes
	if (!route) throw new Error("there is one route")
	const withPage = { ...route, element: <Sheet {...props} /> }
	const context = {
		basename: "/",
		location: { pathname: page.path, search: "", hash: "", state: null, key: "default", mask: undefined },
		matches: [{ params: page.params, pathname: page.path, pathnameBase: page.path, route: withPage }],
		loaderData: {},
		actionData: null,
		errors: null,
		statusCode: 200,
		loaderHeaders: {},
		actionHeaders: {},
	}
	return <StaticRouterProvider router={createStaticRouter([withPage], context)} context={context} hydrate={false} />
}

function titleOf(loaderData: SheetData): string {
	const [first] = meta({ loaderData } as Parameters<typeof meta>[0]) ?? []
	return first && "title" in first ? String(first.title) : ""
}
