import { resolve } from "node:path"
import { pathToFileURL } from "node:url"

type Handler = ((args: never) => unknown) & { admits?: string }

/** A route of the built product. `path` is the whole address with its parts as ":name". */
export type BuiltRoute = { id: string; path: string; loader: Handler | undefined; action: Handler | undefined }

type Manifest = Record<
	string,
	{ id: string; parentId?: string; path?: string; module: { loader?: Handler; action?: Handler } }
>

/** Every route of the server that was built, as it serves them. */
export async function builtRoutes(): Promise<BuiltRoute[]> {
	const { routes } = (await import(pathToFileURL(resolve("build/server/index.js")).href)) as { routes: Manifest }
	const pathOf = (id: string | undefined): string[] => {
		const route = id === undefined ? undefined : routes[id]
		return route ? [...pathOf(route.parentId), ...(route.path ? [route.path] : [])] : []
	}
	return Object.values(routes).map(({ id, module }) => ({
		id,
		path: `/${pathOf(id).join("/")}`,
		loader: module.loader,
		action: module.action,
	}))
}

/** The address of a route with its parts filled in. At the stall a day is a market day's id. */
export function addressOf(route: BuiltRoute, params: Record<string, string>): string {
	return route.path.replaceAll(/:(\w+)\??/g, (_, name: string) => {
		const value = name === "day" && route.path.startsWith("/stall/") ? params.marketDay : params[name]
		if (value === undefined) throw new Error(`the walk knows nothing to put for :${name} in ${route.path}`)
		return encodeURIComponent(value)
	})
}
