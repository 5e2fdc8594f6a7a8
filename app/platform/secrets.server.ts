import { createCipheriv, createDecipheriv, createHmac, hkdfSync, randomBytes, timingSafeEqual } from "node:crypto"
import { env } from "./env.server"

const NONCE_BYTES = 12
const TAG_BYTES = 16

/** What a secret is used for. Each purpose has its own key, so that a value made for one is worth nothing in another. */
export type Purpose = "sign-in-code" | "sign-in-mail" | "sign-in-cookie" | "kept-post" | "rate-limit" | "totp"

/** 256 random bits as 43 characters that may stand in an address or a cookie. */
export function randomToken(): string {
	return randomBytes(32).toString("base64url")
}

/** The key of one purpose, 32 bytes, derived from SESSION_SECRET. */
export function keyFor(purpose: Purpose): Buffer {
	return Buffer.from(hkdfSync("sha256", Buffer.from(env.SESSION_SECRET, "hex"), "", `waxbill ${purpose}`, 32))
}

/** HMAC-SHA-256 over `parts` as hex. Parts are told apart by their length, so that "ab", "c" is not "a", "bc". */
export function hmac(purpose: Purpose, ...parts: string[]): string {
	const mac = createHmac("sha256", keyFor(purpose))
	for (const part of parts) mac.update(`${Buffer.byteLength(part)}:${part}`)
	return mac.digest("hex")
}

/** Whether two hashes are the same, in a time that does not depend on where they differ. */
export function isSameHash(left: string, right: string): boolean {
	const a = Buffer.from(left)
	const b = Buffer.from(right)
	return a.length === b.length && timingSafeEqual(a, b)
}

/** Encrypts `value` (plain JSON) with AES-256-GCM, as text that may stand in a cookie or a job. */
export function seal(purpose: Purpose, value: unknown): string {
	const nonce = randomBytes(NONCE_BYTES)
	const cipher = createCipheriv("aes-256-gcm", keyFor(purpose), nonce)
	const body = Buffer.concat([cipher.update(JSON.stringify(value), "utf8"), cipher.final()])
	return Buffer.concat([nonce, cipher.getAuthTag(), body]).toString("base64url")
}

/** What `seal` was given, or null when `sealed` was not made by it for this purpose under the present secret. */
export function unseal(purpose: Purpose, sealed: string): unknown {
	const bytes = Buffer.from(sealed, "base64url")
	if (bytes.length < NONCE_BYTES + TAG_BYTES) return null
	const nonce = bytes.subarray(0, NONCE_BYTES)
	const decipher = createDecipheriv("aes-256-gcm", keyFor(purpose), nonce, { authTagLength: TAG_BYTES })
	decipher.setAuthTag(bytes.subarray(NONCE_BYTES, NONCE_BYTES + TAG_BYTES))
	try {
		const body = Buffer.concat([decipher.update(bytes.subarray(NONCE_BYTES + TAG_BYTES)), decipher.final()])
		return JSON.parse(body.toString("utf8"))
	} catch {
		return null
	}
}
