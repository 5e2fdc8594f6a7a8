/** Headers that set these cookies. */
export function settingCookies(cookies: readonly string[]): Headers {
	const headers = new Headers({ "cache-control": "no-store" })
	for (const cookie of cookies) headers.append("set-cookie", cookie)
	return headers
}
