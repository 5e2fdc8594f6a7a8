import { z } from "zod"

/**
 * The kinds of value a letter is made of. Everything is plain JSON, since the props of a letter wait in the outbox
 * between the decision and the sending. Optional values may be null, as they come from a table.
 */
export const words = z.string().trim().min(1).max(300)
export const sentence = z.string().trim().min(1).max(1000)
export const day = z.iso.date()
export const cents = z.int()
export const cases = z.int().nonnegative()
export const mailAddress = z.email()
/** Only web addresses: a link of another scheme has no place in a letter. */
export const webAddress = z.url({ protocol: /^https?$/ })

/** Draws a document elsewhere, by the name of the program that does; null where there is none, and it is drawn here. */
export type DrawElsewhere = (program: "draw-invoices" | "draw-statements", props: unknown) => Promise<Uint8Array> | null

/** The producer at the head and foot of a letter; answers go to `email`. `contactName` is whom to ask for. */
export const yard = z.object({
	name: words,
	address: words,
	email: mailAddress,
	phone: words.nullish(),
	contactName: words.nullish(),
})
export type Yard = z.infer<typeof yard>

/** A sum below the lines: delivery, sales tax, a part already paid (negative). */
export const charge = z.object({ label: words, cents })

export const sampleYard = {
	name: "Larkmoor Bee Yard",
	address: "Weld Lane, Teasel County",
	email: "orders@larkmoor.example.test",
	phone: "(555) 010-0142",
	contactName: "Ida",
} satisfies Yard
