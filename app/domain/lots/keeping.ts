/** How long honey keeps by its water: up to and with `upToTenths` of a percent, the last class open. */
const FERMENTATION: readonly { upToTenths: number; risk: string }[] = [
	{ upToTenths: 170, risk: "safe whatever the yeast count" },
	{ upToTenths: 180, risk: "safe if under 1000 yeasts per g" },
	{ upToTenths: 190, risk: "safe if under 10 per g" },
	{ upToTenths: 200, risk: "safe if under 1 per g" },
	{ upToTenths: Number.POSITIVE_INFINITY, risk: "always in danger" },
]

/** The most water for USDA Grades A and B, and C, of extracted honey, and for honey in California, in tenths of a percent. */
export const MOISTURE_LIMITS = { usdaGradeAB: 186, usdaGradeC: 200, california: 200 } as const

function requireMoisture(tenths: number): void {
	if (!Number.isFinite(tenths) || tenths < 0 || tenths > 1000) throw new RangeError(`not a share of water: ${tenths}`)
}

/**
 * What honey with so many tenths of a percent of water does: safe, safe below a count of yeasts, or always in danger of
 * fermenting. Throws RangeError outside 0 to 100 %. Source: Lochhead's classes, as given in USDA Agriculture Handbook 335.
 */
export function fermentationRisk(moistureTenths: number): string {
	requireMoisture(moistureTenths)
	return (FERMENTATION.find(({ upToTenths }) => moistureTenths <= upToTenths) as (typeof FERMENTATION)[number]).risk
}

/** A warning in words with its source; `isOverLimit` when a published limit is passed. */
export type MoistureAdvice = { words: string; source: string; isOverLimit: boolean }

/**
 * What to say of a lot's water, in tenths of a percent; null when it keeps whatever the yeast. Over 18.6 % it is above
 * USDA Grades A and B, over 20 % above Grade C and California's limit. Those grades are for extracted honey; comb has no
 * limit of its own that could be verified. Sources: Lochhead in Agriculture Handbook 335; USDA Grades of Extracted Honey
 * (1985, from memory); Cal. Food & Agric. Code 29413.
 */
export function moistureAdvice(moistureTenths: number): MoistureAdvice | null {
	const risk = fermentationRisk(moistureTenths)
	const water = `${(moistureTenths / 10).toFixed(1)} % of water`
	if (moistureTenths > MOISTURE_LIMITS.california) {
		return {
			words: `${water} is over the 20.0 % of USDA Grade C and of California: this comb is always in danger of fermenting. Keep it frozen, and do not sell it before it is drier.`,
			source: "Lochhead, in USDA Agriculture Handbook 335; Cal. Food & Agric. Code 29413",
			isOverLimit: true,
		}
	}
	if (moistureTenths > MOISTURE_LIMITS.usdaGradeAB) {
		return {
			words: `${water} is over the 18.6 % of USDA Grades A and B: it may ferment (its yeasts decide: ${risk}). Keep it frozen until it is sold, and sell it soon.`,
			source: "Lochhead, in USDA Agriculture Handbook 335; USDA, Grades of Extracted Honey (1985)",
			isOverLimit: true,
		}
	}
	if (moistureTenths <= 170) return null
	return {
		words: `${water} keeps unless yeasts are many: it is ${risk}.`,
		source: "Lochhead, in USDA Agriculture Handbook 335",
		isOverLimit: false,
	}
}

/** How soon honey granulates. */
export type Granulation = "stays liquid long" | "intermediate" | "granulates quickly"

/**
 * How soon honey granulates by glucose over water, in hundredths: 170 and 210 are intermediate. Throws RangeError below
 * zero. Source: ratios as read in secondary texts.
 */
export function granulationTendency(ratioHundredths: number): Granulation {
	if (!Number.isFinite(ratioHundredths) || ratioHundredths < 0) {
		throw new RangeError(`not a ratio of glucose to water: ${ratioHundredths}`)
	}
	if (ratioHundredths < 170) return "stays liquid long"
	return ratioHundredths > 210 ? "granulates quickly" : "intermediate"
}

/** Where honey granulates fastest: 57 °F, 14 °C (from memory, Dyce); 52 to 59 °F in one text. */
export const WORST_FOR_GRANULATION = { fahrenheit: 57, celsius: 14, fromFahrenheit: 52, toFahrenheit: 59 } as const
