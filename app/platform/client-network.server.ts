import { isIPv6 } from "node:net"

/**
 * The network that a request comes from, to count by: an IPv4 address, or the first four groups of an IPv6 one, since a
 * single customer holds at least that many. The web server writes the header over whatever the client sent; without it
 * all count as one.
 */
export function clientNetwork(request: Request): string {
	const address = request.headers.get("x-client-address")?.split("%", 1)[0] ?? "unknown"
	if (!isIPv6(address)) return address
	const mapped = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i.exec(address)?.[1]
	return mapped ?? `${firstGroups(address).join(":")}::/64`
}

function firstGroups(address: string): string[] {
	const [head = "", tail = ""] = address.split("::")
	const before = head.split(":").filter(Boolean)
	const after = tail.split(":").filter(Boolean)
	const missing = address.includes("::") ? Math.max(8 - before.length - after.length, 0) : 0
	const groups = [...before, ...Array<string>(missing).fill("0"), ...after]
	return groups.slice(0, 4).map((group) => Number.parseInt(group, 16).toString(16))
}
