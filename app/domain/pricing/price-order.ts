/** What a case costs from `minCases` up; an estimate where `poundCents`, the price of a pound, is set. */
export type CaseBreak = { minCases: number; caseCents: number; poundCents?: number | null }

/** One line to price. */
export type PriceLine = {
	productId: string
	/** Cases asked for; they decide the break, also after the line was cut short. */
	cases: number
	/** Cases given once that is decided; they decide the amount. Left out, all that is asked is priced. */
	givenCases?: number
	piecesPerCase: number
	/** Lines of one family are counted together for the break. */
	breakFamily: string
	/** At least one; in any order. */
	breaks: readonly CaseBreak[]
	/** Asked beyond what is free: stays out of the sure total and of the delivery terms until it is shared out. */
	toBeSharedOut?: boolean
}

/** A store's terms for the way to it, in cents. */
export type DeliveryTerms = { minimumCents: number; deliveryChargeCents: number; freeAboveCents: number | null }

/** The price of one line. */
export type PricedLine = {
	productId: string
	/** Cases that are charged: given where decided, else asked. */
	cases: number
	pieces: number
	caseCents: number
	/** Set where it is priced by weight: `caseCents` is then an estimate. */
	poundCents: number | null
	lineCents: number
	/** Which break applies, counted from 0 by rising `minCases`; the first also where the family is below it. */
	breakIndex: number
	/** The next cheaper break, and how many more cases of the family reach it; null on the last. */
	nextBreak: { atCases: number; addCases: number; caseCents: number } | null
	toBeSharedOut: boolean
}

/** The price of an order. Amounts are cents; "sure" leaves out lines that are still to be shared out. */
export type OrderPrice = {
	lines: PricedLine[]
	sureCases: number
	sureCents: number
	sharedCases: number
	/** The most that the lines to be shared out can come to. */
	sharedCents: number
	/** All cases, and all goods if every line is met. */
	cases: number
	upToCents: number
	deliveryCents: number
	/** Sure goods and delivery: what is to pay as things stand. */
	totalCents: number
	/** What the order lacks to the store's minimum, and to free delivery (null where delivery is never free). */
	minimumShortCents: number
	freeShortCents: number | null
}

function requireWhole(name: string, value: number): void {
	if (!Number.isSafeInteger(value) || value < 0) throw new RangeError(`${name} is not a whole number: ${value}`)
}

function sum(values: readonly number[]): number {
	return values.reduce((total, value) => total + value, 0)
}

function countFamilies(lines: readonly PriceLine[]): Map<string, number> {
	const families = new Map<string, number>()
	for (const line of lines) families.set(line.breakFamily, (families.get(line.breakFamily) ?? 0) + line.cases)
	return families
}

function priceLine(line: PriceLine, familyCases: number): PricedLine & { askedCents: number } {
	requireWhole("cases", line.cases)
	requireWhole("givenCases", line.givenCases ?? 0)
	requireWhole("piecesPerCase", line.piecesPerCase)
	const breaks = line.breaks.toSorted((a, b) => a.minCases - b.minCases)
	const breakIndex = Math.max(
		0,
		breaks.findLastIndex((step) => step.minCases <= familyCases),
	)
	const active = breaks[breakIndex]
	if (!active) throw new RangeError(`product ${line.productId} has no price`)
	requireWhole("caseCents", active.caseCents)
	const next = breaks[breakIndex + 1]
	const cases = line.givenCases ?? line.cases
	return {
		productId: line.productId,
		cases,
		pieces: cases * line.piecesPerCase,
		caseCents: active.caseCents,
		poundCents: active.poundCents ?? null,
		lineCents: cases * active.caseCents,
		breakIndex,
		nextBreak: next
			? { atCases: next.minCases, addCases: next.minCases - familyCases, caseCents: next.caseCents }
			: null,
		toBeSharedOut: line.toBeSharedOut === true && line.givenCases === undefined,
		askedCents: line.cases * active.caseCents,
	}
}

/**
 * Prices an order for one store: the break of every line, the sure and the possible total, and the delivery. The break of
 * a line is the one reached by all cases asked of its family in the order, lines still to be shared out included. Sure
 * goods alone count toward minimum and free delivery; a line that was cut short counts with what it asked. Delivery is
 * free when that sum is at or above `freeAboveCents`, nothing where no case is charged, else the store's charge.
 * Falling short of the minimum is told, not refused. Lines come back in the order given; nothing is rounded.
 * Throws RangeError on a line without a price and on negative or fractional numbers.
 * This product's own rule.
 */
export function priceOrder(order: { lines: readonly PriceLine[]; terms: DeliveryTerms }): OrderPrice {
	const { terms } = order
	const families = countFamilies(order.lines)
	const priced = order.lines.map((line) => priceLine(line, families.get(line.breakFamily) ?? 0))
	const sure = priced.filter((line) => !line.toBeSharedOut)
	const shared = priced.filter((line) => line.toBeSharedOut)

	const cases = sum(priced.map((line) => line.cases))
	const sureCents = sum(sure.map((line) => line.lineCents))
	const sharedCents = sum(shared.map((line) => line.lineCents))
	const countedCents = sum(sure.map((line) => line.askedCents))
	const isFree = terms.freeAboveCents !== null && countedCents >= terms.freeAboveCents
	const deliveryCents = cases === 0 || isFree ? 0 : terms.deliveryChargeCents

	return {
		lines: priced.map(({ askedCents: _, ...line }) => line),
		sureCases: sum(sure.map((line) => line.cases)),
		sureCents,
		sharedCases: sum(shared.map((line) => line.cases)),
		sharedCents,
		cases,
		upToCents: sureCents + sharedCents,
		deliveryCents,
		totalCents: sureCents + deliveryCents,
		minimumShortCents: Math.max(0, terms.minimumCents - countedCents),
		freeShortCents: terms.freeAboveCents === null ? null : Math.max(0, terms.freeAboveCents - countedCents),
	}
}
