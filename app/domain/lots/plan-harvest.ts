import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { type CountedGrades, countHarvest } from "./count-harvest"
import { readLotCode } from "./lot-code"

/** A super that can come off: it is on a hive. */
export type OffSuper = { id: string; label: string; productId: string; capacityPieces: number; setOn: Day }

/** What was written down of one product. Days are in the producer's zone, readings in tenths. */
export type WrittenProduct = {
	productId: string
	supers: readonly { id: string; counted: CountedGrades }[]
	total: CountedGrades
	moistureTenths: number | null
	pfundTenths: number | null
	flora: string
	expectedReleaseOn: Day
	bestBeforeOn: Day
	/** Lot codes by grade where they are not to follow the producer's pattern. */
	codes: Record<string, string>
}

export type WrittenHarvest = { harvestedOn: Day; products: readonly WrittenProduct[] }

export type PlannedLot = { grade: string; pieces: number; code: string | null }
export type PlannedProduct = Omit<WrittenProduct, "supers" | "total" | "codes"> & {
	lots: PlannedLot[]
	finished: { superId: string; pieces: number }[]
}

/** What is wrong, and with what: the harvest's day, a product's dates or sum, a super, or a code. */
export type HarvestProblem = {
	at: { harvestedOn: true } | { productId: string; part: string } | { superId: string } | null
	message: string
}

/**
 * Turns what was written down into lots: one for each product and grade, culls among them. Refuses, with a sentence for
 * each, a day to come or before a super was set on, more pieces than a super holds, nothing at all, dates out of order, a
 * super that is not on a hive, and a lot code that is wrong or written twice. `supers` are those on hives.
 */
export function planHarvest(
	written: WrittenHarvest,
	{ supers, today }: { supers: readonly OffSuper[]; today: Day },
): Result<{ products: PlannedProduct[] }, { ok: false; reason: "problems"; problems: HarvestProblem[] }> {
	const onHives = new Map(supers.map((one) => [one.id, one]))
	const problems: HarvestProblem[] = dayProblems(written, { onHives, today })
	const products: PlannedProduct[] = []
	for (const product of written.products) {
		const planned = planProduct(product, { onHives, harvestedOn: written.harvestedOn })
		problems.push(...planned.problems)
		if (planned.product) products.push(planned.product)
	}
	const isEmpty = products.every(({ lots }) => lots.length === 0)
	if (isEmpty && problems.length === 0) problems.push({ at: null, message: "Write how many pieces came off." })
	problems.push(...twiceProblems(products))
	return problems.length > 0 ? { ok: false, reason: "problems", problems } : { ok: true, products }
}

type Facts = { onHives: ReadonlyMap<string, OffSuper> }

function dayProblems(written: WrittenHarvest, { onHives, today }: Facts & { today: Day }): HarvestProblem[] {
	const at = { harvestedOn: true } as const
	if (written.harvestedOn > today) return [{ at, message: "This day is still to come. Write the day it came off." }]
	const chosen = written.products.flatMap(({ supers }) => supers.flatMap(({ id }) => onHives.get(id) ?? []))
	const later = chosen.find(({ setOn }) => setOn > written.harvestedOn)
	return later ? [{ at, message: `${later.label} was set on after this day.` }] : []
}

function planProduct(
	{ supers, total, codes, ...facts }: WrittenProduct,
	{ onHives, harvestedOn }: Facts & { harvestedOn: Day },
): { product: PlannedProduct | null; problems: HarvestProblem[] } {
	const problems = dateProblems(facts, harvestedOn)
	const counted = supers.flatMap(({ id, counted }) => {
		const found = onHives.get(id)
		return found && found.productId === facts.productId ? [{ ...found, counted }] : []
	})
	if (counted.length < supers.length) {
		problems.push({ at: null, message: "One of these supers is no longer on a hive. Go back and choose again." })
	}
	const count = countHarvest({ supers: counted, total })
	if (!count.ok) {
		const at = count.superId ? { superId: count.superId } : { productId: facts.productId, part: "total" }
		return { product: null, problems: [...problems, { at, message: count.message }] }
	}
	const { grades, finished } = count.count
	const lots = Object.entries(grades).map(([grade, pieces]) => {
		const typed = codes[grade]?.trim() ?? ""
		if (typed === "") return { grade, pieces, code: null }
		const read = readLotCode(typed)
		if (!read.ok) problems.push({ at: { productId: facts.productId, part: `code-${grade}` }, message: read.message })
		return { grade, pieces, code: typed }
	})
	return { product: { ...facts, lots, finished }, problems }
}

function dateProblems(
	{
		productId,
		expectedReleaseOn,
		bestBeforeOn,
	}: Pick<WrittenProduct, "productId" | "expectedReleaseOn" | "bestBeforeOn">,
	harvestedOn: Day,
): HarvestProblem[] {
	if (expectedReleaseOn < harvestedOn) {
		const message = "A lot cannot be released before it comes off. Write a later day."
		return [{ at: { productId, part: "release" }, message }]
	}
	if (bestBeforeOn >= expectedReleaseOn) return []
	return [{ at: { productId, part: "best-before" }, message: "Best before must be after the release." }]
}

function twiceProblems(products: readonly PlannedProduct[]): HarvestProblem[] {
	const seen = new Set<string>()
	const problems: HarvestProblem[] = []
	for (const { productId, lots } of products) {
		for (const { code, grade } of lots) {
			if (code !== null && seen.has(code)) {
				const message = `Lot code ${code} is written twice. Each lot has a code of its own.`
				problems.push({ at: { productId, part: `code-${grade}` }, message })
			}
			if (code !== null) seen.add(code)
		}
	}
	return problems
}
