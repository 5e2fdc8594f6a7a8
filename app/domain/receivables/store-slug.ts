/** Names in addresses that pages of their own have. */
const TAKEN = ["new"]

/** A store's name as it stands in addresses: "Pantry & Plume" is "pantry-and-plume". Empty when nothing of it can. */
export function slugOf(name: string): string {
	return name
		.normalize("NFD")
		.toLowerCase()
		.replaceAll("&", " and ")
		.replaceAll(/[\p{Mn}'’]/gu, "")
		.replaceAll(/[^a-z0-9]+/g, "-")
		.replaceAll(/^-+|-+$/g, "")
		.slice(0, 60)
		.replace(/-+$/, "")
}

/** Whether a store may have that name in addresses. */
export function isStoreSlug(text: string): boolean {
	return /^[a-z0-9]+(-[a-z0-9]+)*$/.test(text) && text.length <= 60 && !TAKEN.includes(text)
}
