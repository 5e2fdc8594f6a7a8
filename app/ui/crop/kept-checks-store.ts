import { type DBSchema, type IDBPDatabase, openDB } from "idb"
import type { Day } from "~/domain/calendar"
import type { CheckErrors, CheckFields } from "./check-words"

/** The super that a check is about, so that its form can be opened without asking anyone. */
export type CheckedSuper = { id: string; name: string; capacityPieces: number; setOn: Day }

/** A check on this phone: made here under its id, and not taken by the server yet. */
export type KeptCheck = {
	id: string
	/** The producer's name in addresses. */
	producer: string
	madeBy: { id: string; name: string }
	about: CheckedSuper
	fields: CheckFields
	seen: { checkedOn: Day; filledPercent: number; cappedPercent: number; sections: string }
	photo: { bytes: ArrayBuffer; type: string; name: string } | null
	keptAt: number
	/** Why the server would not take it. Null while it waits. */
	refused: { errors: CheckErrors; newId: string | null } | null
}

/** How the last sending ended. */
export type SendState = "rest" | "sending" | "sent" | "no-signal" | "sign-in" | "not-admitted" | "trouble"

interface Book extends DBSchema {
	checks: { key: string; value: KeptCheck }
}

let opened: Promise<IDBPDatabase<Book>> | undefined

function openBook(): Promise<IDBPDatabase<Book>> {
	opened ??= openDB<Book>("waxbill-yard", 1, {
		upgrade: (book) => {
			book.createObjectStore("checks", { keyPath: "id" })
		},
	})
	return opened
}

/** Writes a check down on the phone, over an earlier form of the same. Rejects where the browser keeps nothing. */
export async function keepCheck(check: KeptCheck): Promise<void> {
	await (await openBook()).put("checks", check)
}

/** Throws a kept check away, for good. */
export async function dropCheck(id: string): Promise<void> {
	await (await openBook()).delete("checks", id)
}

/** What is kept for a producer, the earliest first. */
export async function listKept(producer: string): Promise<KeptCheck[]> {
	const all = await (await openBook()).getAll("checks")
	return all.filter((check) => check.producer === producer).sort((a, b) => a.keptAt - b.keptAt)
}

/** The state that a sending ends in, and what the server took. */
export type Sending = { state: SendState; taken: KeptCheck[] }

/**
 * Sends what waits, one check after the other, under the account that is signed in now: what another account made stays.
 * What the server takes is thrown away here; what it refuses stays with the reason. Without signal or session all stays.
 */
export async function sendKept(producer: string): Promise<Sending> {
	const waiting = (await listKept(producer)).filter(({ refused }) => refused === null)
	if (waiting.length === 0) return { state: "rest", taken: [] }
	const address = `/desk/${producer}/crop/checks`
	const taken: KeptCheck[] = []
	// One that the server stumbles over does not hold up the others.
	let isTroubled = false
	try {
		const asked = await fetch(address, { redirect: "manual", cache: "no-store" })
		const gate = gateOf(asked)
		if (gate) return { state: gate, taken }
		const { personId } = (await asked.json()) as { personId: string }
		for (const check of waiting.filter(({ madeBy }) => madeBy.id === personId)) {
			const answer = await fetch(address, { method: "POST", redirect: "manual", body: formOf(check) })
			if (answer.status === 422 || answer.status === 413) {
				await keepCheck({ ...check, refused: await refusalOf(answer) })
				continue
			}
			const shut = gateOf(answer)
			if (shut === "trouble") isTroubled = true
			else if (shut) return { state: shut, taken }
			else {
				await dropCheck(check.id)
				taken.push(check)
			}
		}
		return { state: isTroubled ? "trouble" : taken.length > 0 ? "sent" : "rest", taken }
	} catch {
		return { state: "no-signal", taken }
	}
}

/** What keeps everything from being sent, or null. A redirect leads to the sign-in page. */
function gateOf(answer: Response): SendState | null {
	if (answer.type === "opaqueredirect") return "sign-in"
	if (answer.ok) return null
	return answer.status === 403 || answer.status === 404 ? "not-admitted" : "trouble"
}

async function refusalOf(answer: Response): Promise<NonNullable<KeptCheck["refused"]>> {
	if (answer.status === 413) return { errors: [{ field: "photo", message: "The photo is too large." }], newId: null }
	return (await answer.json()) as NonNullable<KeptCheck["refused"]>
}

function formOf({ id, about, madeBy, fields, photo }: KeptCheck): FormData {
	const form = new FormData()
	for (const [name, value] of Object.entries({ checkId: id, superId: about.id, madeBy: madeBy.id, ...fields })) {
		form.set(name, value)
	}
	if (photo) form.set("photo", new File([photo.bytes], photo.name, { type: photo.type }))
	return form
}

/** An id made here; also where the page came without https, which has no `randomUUID`. */
export function newCheckId(): string {
	const bytes = crypto.getRandomValues(new Uint8Array(16))
	bytes[6] = ((bytes[6] ?? 0) & 0x0f) | 0x40
	bytes[8] = ((bytes[8] ?? 0) & 0x3f) | 0x80
	const hex = Array.from(bytes, (byte) => byte.toString(16).padStart(2, "0")).join("")
	return [hex.slice(0, 8), hex.slice(8, 12), hex.slice(12, 16), hex.slice(16, 20), hex.slice(20)].join("-")
}
