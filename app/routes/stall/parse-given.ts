const AMOUNT = /^\$?\s*(\d{1,5})(?:[.,](\d{1,2}))?$/

/** Reads an amount of money handed over: "60", "49.50", "$49,5". A sentence says what is wrong otherwise. */
export function parseGiven(text: string): { ok: true; cents: number } | { ok: false; message: string } {
	const [, dollars, cents = ""] = AMOUNT.exec(text.trim()) ?? []
	if (dollars === undefined) return { ok: false, message: "Write dollars and cents, such as 60 or 49.50." }
	return { ok: true, cents: Number(dollars) * 100 + Number(cents.padEnd(2, "0")) }
}
