import type { gradeSchemes, gradings, lots, products } from "~/db/schema"
import { addDays } from "~/domain/calendar"
import { type GradingFacts, gradeComb } from "~/domain/grading/grade-comb"
import { type SchemeTemplate, schemeTemplates } from "~/domain/grading/templates"
import type { Catalogue, CatalogueProduct } from "./plan-catalogue"
import { named, type Season } from "./season"

type Lot = typeof lots.$inferInsert

export type Gradings = {
	schemes: (typeof gradeSchemes.$inferInsert)[]
	gradings: (typeof gradings.$inferInsert)[]
}

/** Pfund readings of a colour, in tenths of a millimetre, the least and the most. */
const PFUND: Record<NonNullable<(typeof products.$inferInsert)["colour"]>, readonly [number, number]> = {
	straw: [190, 330],
	light: [350, 490],
	amber: [620, 840],
	dark: [1160, 1300],
}

/**
 * The readings of every lot, and the grading of those whose form a template covers. Writes grade, flora, moisture and
 * colour into `stock`. Schemes are the templates as they stand.
 */
export function planGradings(season: Season, catalogue: Catalogue, stock: readonly Lot[]): Gradings {
	const { producerId, chance } = season
	const products = new Map([...catalogue.products.values()].map((product) => [product.id, product]))
	const plan: Gradings = {
		schemes: schemeTemplates.map(({ name, scheme }) => ({ producerId, id: chance.id(), name, scheme })),
		gradings: [],
	}
	for (const lot of stock) {
		const product = named(products, lot.productId)
		const [least, most] = PFUND[product.colour]
		lot.flora = product.flora
		lot.moistureTenths = chance.whole(164, 184)
		lot.pfundTenths = chance.whole(least, most)
		const template = schemeFor(product)
		if (!template) continue
		const grading = gradingRow(season, { lot, product, template, pfundTenths: lot.pfundTenths })
		lot.grade = grading.grade
		plan.gradings.push(grading)
	}
	return plan
}

function schemeFor(product: CatalogueProduct): SchemeTemplate | undefined {
	const name = product.form === "chunk" ? "Wisconsin, chunk honey" : "Eastern rules (1911)"
	return schemeTemplates.find((template) => template.name === name && template.scheme.forms.includes(product.form))
}

function gradingRow(
	{ producerId, chance, scenario, userId }: Season,
	seen: { lot: Lot; product: CatalogueProduct; template: SchemeTemplate; pfundTenths: number },
): Gradings["gradings"][number] {
	const { lot, product, template, pfundTenths } = seen
	const isBest = product.grade === "Fancy"
	const facts: GradingFacts = {
		measured:
			product.form === "chunk"
				? { combPercent: 5200 + 100 * chance.whole(0, 4), combPieces: 100, brokenPieces: 0 }
				: { attachedPercent: isBest ? 10_000 : 9200, soiledPercent: isBest ? 0 : 100 * chance.whole(2, 11) },
		isOutsideRowOpen: !isBest,
		faults: [],
		pfundTenths,
		caseWeighed: null,
		piecesSeen: 12,
		piecesBelow: 0,
	}
	const { grade, reasons } = gradeComb(template.scheme, facts)
	return {
		producerId,
		id: chance.id(),
		lotId: lot.id ?? "",
		gradedOn: addDays(lot.harvestedOn, 1),
		schemeName: template.name,
		scheme: template.scheme,
		facts,
		grade,
		reasons,
		gradedBy: userId(scenario.packerEmail),
		createdAt: lot.createdAt,
	}
}
