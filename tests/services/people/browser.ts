import { env } from "~/platform/env.server"

/** Keeps cookies from one answer to the next request, as a browser does; tests may edit them, as an attacker does. */
export class Browser {
	readonly cookies = new Map<string, string>()

	/** Takes over Set-Cookie lines; one that has expired removes its cookie. */
	take(lines: readonly string[]): void {
		for (const line of lines) {
			const [pair = "", ...attributes] = line.split("; ")
			const name = pair.slice(0, pair.indexOf("="))
			const isRemoval = attributes.some((attribute) => attribute.startsWith("Expires=Thu, 01 Jan 1970"))
			if (isRemoval) this.cookies.delete(name)
			else this.cookies.set(name, pair.slice(name.length + 1).replace(/^"(.*)"$/, "$1"))
		}
	}

	get(path: string): Request {
		return new Request(`${env.BASE_URL}${path}`, { headers: this.headers() })
	}

	/** A form as a browser posts it, its length told. */
	post(path: string, fields: Record<string, string> | [string, string][], origin = env.BASE_URL): Request {
		const body = new URLSearchParams(fields).toString()
		return new Request(`${origin}${path}`, {
			method: "POST",
			body,
			headers: {
				...this.headers(),
				origin,
				"content-type": "application/x-www-form-urlencoded",
				"content-length": String(Buffer.byteLength(body)),
			},
		})
	}

	private headers(): Record<string, string> {
		const cookie = [...this.cookies].map(([name, value]) => `${name}=${value}`).join("; ")
		return { "user-agent": "Mozilla/5.0 (X11; Linux x86_64) Firefox/140.0", ...(cookie && { cookie }) }
	}
}
