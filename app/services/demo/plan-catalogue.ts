import type { prices, priceTiers, products } from "~/db/schema"
import { addDays } from "~/domain/calendar"
import type { CaseBreak } from "~/domain/pricing/price-order"
import { labelledGrams } from "~/domain/weight"
import type { DemoProduct } from "./scenario"
import type { Season } from "./season"

/** A product with its id. */
export type CatalogueProduct = DemoProduct & { id: string }

export type Catalogue = {
	products: ReadonlyMap<string, CatalogueProduct>
	tierIds: ReadonlyMap<string, string>
	/** The breaks of a product in a tier, by tier name and product code. */
	breaks: (tier: string, code: string) => CaseBreak[]
	rows: {
		tiers: (typeof priceTiers.$inferInsert)[]
		products: (typeof products.$inferInsert)[]
		prices: (typeof prices.$inferInsert)[]
	}
}

const BREAKS = [1, 3, 6] as const

/** The price list: products, tiers, and three breaks of each product in each tier, in force since before the season. */
export function planCatalogue({ scenario, producerId, today, chance }: Season): Catalogue {
	const products = new Map(scenario.products.map((product) => [product.code, { ...product, id: chance.id() }]))
	const tiers = scenario.tiers.map((tier) => ({ ...tier, id: chance.id() }))
	const validFrom = addDays(today, -7 * scenario.seasonWeeks - 30)
	const caseBreaks = (percent: number, product: DemoProduct): CaseBreak[] =>
		BREAKS.map((minCases, index) => ({
			minCases,
			// Whole dimes, as a price list has them.
			caseCents: percent === 100 ? cents(product, index) : Math.round((cents(product, index) * percent) / 1000) * 10,
		}))
	return {
		products,
		tierIds: new Map(tiers.map((tier) => [tier.name, tier.id])),
		breaks: (tier, code) => {
			const percent = tiers.find(({ name }) => name === tier)?.percent
			const product = products.get(code)
			if (percent === undefined || !product) throw new Error(`the demo has no price of ${code} for ${tier}`)
			return caseBreaks(percent, product)
		},
		rows: {
			tiers: tiers.map(({ id, name }) => ({ producerId, id, name })),
			products: [...products.values()].map((product) => ({
				producerId,
				id: product.id,
				code: product.code,
				name: product.name,
				form: product.form,
				grade: product.grade,
				flora: product.flora,
				colour: product.colour,
				detail: product.detail,
				pieceNetGrams: labelledGrams(product.netOunces),
				piecesPerCase: product.piecesPerCase,
				breakFamily: product.breakFamily,
				pieceCents: product.pieceCents,
				reservePieces: product.reservePieces,
			})),
			prices: tiers.flatMap((tier) =>
				[...products.values()].flatMap((product) =>
					caseBreaks(tier.percent, product).map((step) => ({
						producerId,
						id: chance.id(),
						tierId: tier.id,
						productId: product.id,
						...step,
						validFrom,
					})),
				),
			),
		},
	}
}

function cents(product: DemoProduct, index: number): number {
	return product.casePrices[index] ?? product.casePrices[0]
}
