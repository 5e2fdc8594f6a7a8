import { piecesWords } from "~/domain/quantity"

/** What a count of a lot changes, in words; `missing` is what earlier counts did not find of it. */
export function differenceWords(lot: { counted: number; ledger: number; missing: number }): string {
	const { counted, ledger, missing } = lot
	if (counted === ledger) return "agrees"
	if (counted < ledger) return `${piecesWords(ledger - counted)} missing`
	const found = Math.min(counted - ledger, missing)
	return postedMoreWords({ found, unwritten: counted - ledger - found })
}

/** Pieces beyond the ledger: those found again, and those that had never been written down. */
export function postedMoreWords({ found, unwritten }: { found: number; unwritten: number }): string {
	const parts = [
		found > 0 && `${piecesWords(found)} found again`,
		unwritten > 0 && `${piecesWords(unwritten)} never written down; the harvest count rises by ${unwritten}`,
	]
	return parts.filter(Boolean).join(", ")
}
