/**
 * One row of a sampling plan, for lots of `from` to `to` packages: how many are drawn, the sample correction factor as
 * printed, how many may be short by more than the maximum allowable variation, and how many tares are weighed first.
 */
export type SamplingPlan = {
	from: number
	to: number
	sample: number
	correctionFactor: string | null
	shortAllowed: number
	tares: number
	glassTares: number
}

type PlanRow = [from: number, to: number, sample: number, factor: string | null, shortAllowed: number, tares: number]

const ANY = Number.POSITIVE_INFINITY

/**
 * Category A: all packages but meat and poultry at an inspected packer. NIST Handbook 133, Appendix A, Table 2-1, from
 * memory (high; the tare column medium). The factors are kept as printed, not computed: the formula differs from the
 * print in the third decimal.
 */
const CATEGORY_A: readonly PlanRow[] = [
	[1, 1, 1, null, 0, 1],
	[2, 2, 2, "8.985", 0, 2],
	[3, 3, 3, "2.484", 0, 2],
	[4, 4, 4, "1.591", 0, 2],
	[5, 5, 5, "1.241", 0, 2],
	[6, 6, 6, "1.050", 0, 2],
	[7, 7, 7, "0.925", 0, 2],
	[8, 8, 8, "0.836", 0, 2],
	[9, 9, 9, "0.769", 0, 2],
	[10, 10, 10, "0.715", 0, 2],
	[11, 11, 11, "0.672", 0, 2],
	[12, 250, 12, "0.635", 0, 2],
	[251, 3200, 24, "0.422", 0, 3],
	[3201, ANY, 48, "0.291", 1, 3],
]

/**
 * Category B: meat and poultry at an inspected packer, where a negative average fails at once. It never applies to honey.
 * NIST Handbook 133, Appendix A, Table 2-2, from memory (high).
 */
const CATEGORY_B: readonly PlanRow[] = [
	[1, 250, 10, null, 0, 2],
	[251, ANY, 30, null, 0, 5],
]

/**
 * The row of the plan for a lot of so many packages. Category A is the one for honey. Throws RangeError unless the lot has
 * a whole number of packages, one or more.
 */
export function samplingPlan(packages: number, category: "A" | "B" = "A"): SamplingPlan {
	if (!Number.isSafeInteger(packages) || packages < 1) throw new RangeError(`not a lot of packages: ${packages}`)
	const row = (category === "A" ? CATEGORY_A : CATEGORY_B).find(([, to]) => packages <= to)
	if (!row) throw new Error("the last row takes any lot")
	const [from, to, sample, correctionFactor, shortAllowed, tares] = row
	const glassTares = category === "A" ? Math.min(tares, 2) : tares
	return { from, to, sample, correctionFactor, shortAllowed, tares, glassTares }
}

/** Why so many are drawn: "Lots of 12 to 250 packages are judged by 12." */
export function samplingWords({ from, to, sample }: SamplingPlan): string {
	if (to === 1) return "A lot of one package is judged by that one."
	if (from === to) return `In a lot of ${from} every package is weighed.`
	const figures = (count: number) => count.toLocaleString("en-US")
	if (to === ANY) return `Lots of more than ${figures(from - 1)} packages are judged by ${sample}.`
	return `Lots of ${from} to ${figures(to)} packages are judged by ${sample}.`
}
