/**
 * Holds every test to two rules: nothing leaves this machine, and nothing is written to console.error unless the test
 * replaces it: vi.spyOn(console, "error").mockImplementation(() => {}).
 */
import { Socket } from "node:net"
import { afterEach, beforeEach, expect } from "vitest"

const LOOPBACK = new Set(["127.0.0.1", "::1", "localhost", "[::1]"])

const connect = Socket.prototype.connect
Socket.prototype.connect = function (this: Socket, ...args: unknown[]) {
	// Node passes its own normalised argument list as one array; callers pass the options or port and host.
	const [first, second] = (Array.isArray(args[0]) ? args[0] : args) as unknown[]
	const host = typeof first === "object" && first !== null && "host" in first ? first.host : second
	if (typeof host === "string" && !LOOPBACK.has(host)) throw new Error(`A test tried to reach ${host}`)
	return connect.apply(this, args as Parameters<typeof connect>)
} as typeof connect

const complaints: unknown[][] = []
const writeError = console.error

beforeEach(() => {
	complaints.length = 0
	console.error = (...args: unknown[]) => {
		complaints.push(args)
		writeError(...args)
	}
})

afterEach(() => {
	console.error = writeError
	expect(complaints, "nothing is written to console.error").toEqual([])
})
