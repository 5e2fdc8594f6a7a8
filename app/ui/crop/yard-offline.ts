import { useEffect } from "react"

/** Begins the names of the caches that public/yard-worker.js keeps. */
const CACHES = "waxbill-yard-"

/**
 * Keeps the open page and what it is made of on this device, so that it opens without signal. The worker sees the pages of
 * this producer's yards and no others. Does nothing where the browser has no such thing, and nothing while developing.
 */
export function useKeptPage(producer: string, version: number): void {
	useEffect(() => {
		if (!import.meta.env.PROD || !("serviceWorker" in navigator)) return
		const scope = `/desk/${producer}/crop/yards/`
		navigator.serviceWorker
			.register("/yard-worker.js", { scope })
			.then(async (registration) => {
				const worker = await untilActive(registration)
				if (worker) worker.postMessage({ kind: "keep-page", page: pageAddress(version), parts: partsOfPage() })
			})
			// A private window may refuse; the page works on, with signal.
			.catch(() => undefined)
	}, [producer, version])
}

/** Forgets all kept pages: whoever comes next to this device is not shown them. Kept checks stay, under their account. */
export function forgetKeptPages(): void {
	if (!("caches" in window)) return
	caches
		.keys()
		.then((names) => Promise.all(names.filter((name) => name.startsWith(CACHES)).map((name) => caches.delete(name))))
		.catch(() => undefined)
}

function untilActive(registration: ServiceWorkerRegistration): Promise<ServiceWorker | null> {
	const worker = registration.installing ?? registration.waiting ?? registration.active
	if (!worker || worker.state === "activated") return Promise.resolve(worker)
	return new Promise((resolve) => {
		worker.addEventListener("statechange", () => {
			if (worker.state === "activated") resolve(worker)
			if (worker.state === "redundant") resolve(null)
		})
	})
}

/** The page without what it says only once. `version` changes when the page's content has: it is then kept anew. */
function pageAddress(_version: number): string {
	const address = new URL(location.href)
	address.searchParams.delete("checked")
	address.hash = ""
	return address.href
}

/** Scripts, styles, fonts and pictures that the page has loaded, from here alone. */
function partsOfPage(): string[] {
	const loaded = performance.getEntriesByType("resource").map(({ name }) => name)
	const named = [...document.querySelectorAll<HTMLLinkElement>("link[href]")].map(({ href }) => href)
	const ours = [...new Set([...loaded, ...named])].filter((address) => {
		const { origin, pathname } = new URL(address)
		return origin === location.origin && (pathname.startsWith("/assets/") || /\.(svg|ico)$/.test(pathname))
	})
	return ours
}
