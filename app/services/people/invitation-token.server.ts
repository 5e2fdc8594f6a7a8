import { randomToken } from "~/platform/secrets.server"

/**
 * A token that names its producer, since invitations can only be read for one: 22 characters of the id, then 256 random
 * bits.
 */
export function makeInvitationToken(producerId: string): string {
	return Buffer.from(producerId.replaceAll("-", ""), "hex").toString("base64url") + randomToken()
}

/** The producer that a token names, or null when it has not the form of one. */
export function producerOfToken(token: string): string | null {
	if (!/^[A-Za-z0-9_-]{65}$/.test(token)) return null
	const hex = Buffer.from(token.slice(0, 22), "base64url").toString("hex")
	return hex.replace(/^(.{8})(.{4})(.{4})(.{4})(.{12})$/, "$1-$2-$3-$4-$5")
}
