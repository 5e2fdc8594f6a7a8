import { randomBytes } from "node:crypto"

const ALPHABET = "0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz"

/** A new id such as `pi_3f…`: the prefix, an underscore and `length` letters and digits that nobody can guess. */
export function newId(prefix: string, length = 24): string {
	const letters = Array.from(randomBytes(length), (byte) => ALPHABET[byte % ALPHABET.length])
	return `${prefix}_${letters.join("")}`
}
