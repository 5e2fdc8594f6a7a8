import type { lotLinks, lots } from "~/db/schema"
import { instantAt } from "~/domain/calendar"
import type { Stock } from "./ledger"
import { piecesAt } from "./pieces-at"
import type { Catalogue, CatalogueProduct } from "./plan-catalogue"
import type { Season } from "./season"

type Lot = typeof lots.$inferInsert & { id: string }
type Move = Stock["moves"][number]

export type Regrouping = {
	links: (typeof lotLinks.$inferInsert & { at: Date })[]
	/** Lots that were made from others, so that no harvest stands behind them, and those of them that were split off. */
	madeFromLots: Set<string>
	splitOff: Set<string>
}

/** Of what is cut from comb so much more goes in than comes out: drained honey and trimmings. */
const CUTTING_PERCENT = 118

/**
 * Splits one lot that is on the shelf, and lets the smallest lot of cut comb (of jars, where none is cut) have come from
 * culls. Adds the lots and moves to `stock`; what is ready of each product stays the same.
 */
export function regroupLots(season: Season, catalogue: Catalogue, stock: Stock): Regrouping {
	const plan: Regrouping = { links: [], madeFromLots: new Set(), splitOff: new Set() }
	splitOne(season, stock, plan)
	cutUpCulls(season, catalogue, stock, plan)
	stock.moves.sort((a, b) => a.movedAt.getTime() - b.movedAt.getTime())
	return plan
}

function splitOne(season: Season, stock: Stock, plan: Regrouping): void {
	const { chance, now } = season
	const ready = piecesAt(stock.moves, "ready", now)
	const from = stock.lots.find((lot) => lot.state === "released" && (ready.get(lot.id ?? "") ?? 0) >= 24) as Lot
	if (!from) return
	const lot: Lot = { ...from, id: chance.id(), code: nextCode(stock, from), piecesHarvested: 12, createdAt: now }
	stock.lots.push(lot)
	const pieces = 12
	link(season, plan, { fromLotId: from.id, toLotId: lot.id, kind: "split", pieces, piecesMade: pieces, at: now })
	const reason = `split from lot ${from.code}`
	stock.moves.push(
		moveOf(season, { lotId: from.id, fromPlace: "ready", toPlace: "other-lot", toRef: lot.id, pieces, reason }, now),
		moveOf(season, { lotId: lot.id, fromPlace: null, toPlace: "cold-room", pieces, reason }, now),
		moveOf(season, { lotId: lot.id, fromPlace: "cold-room", toPlace: "ready", pieces, reason: "released" }, now),
	)
}

function cutUpCulls(season: Season, catalogue: Catalogue, stock: Stock, plan: Regrouping): void {
	const { chance, scenario } = season
	const products = [...catalogue.products.values()]
	const made = products.find(({ form }) => form === "cut-comb") ?? products.find(({ form }) => form === "chunk")
	const section = products.find(({ form }) => form === "basswood") ?? products[0]
	if (!made || !section) return
	const [to] = stock.lots
		.filter((lot) => lot.productId === made.id && lot.state === "released")
		.toSorted((a, b) => a.piecesHarvested - b.piecesHarvested) as Lot[]
	if (!to) return
	const pieces = Math.ceil((to.piecesHarvested * made.netOunces * CUTTING_PERCENT) / section.netOunces / 100)
	const offAt = instantAt(to.harvestedOn, "14:00", scenario.timeZone)
	const at = instantAt(to.harvestedOn, "16:00", scenario.timeZone)
	const culls: Lot = {
		...to,
		id: chance.id(),
		code: nextCode(stock, { productId: section.id, code: section.lotLetter }),
		productId: section.id,
		piecesHarvested: pieces,
		grade: "Culls",
		createdAt: offAt,
	}
	stock.lots.push(culls)
	link(season, plan, {
		fromLotId: culls.id,
		toLotId: to.id,
		kind: "cut-up",
		pieces,
		piecesMade: to.piecesHarvested,
		lossGrams: lossGrams({ section, pieces, made, piecesMade: to.piecesHarvested }),
		at,
	})
	const off = { lotId: culls.id, fromPlace: null, toPlace: "cold-room", pieces, reason: "off the hives" } as const
	const cut = {
		lotId: culls.id,
		fromPlace: "cold-room",
		toPlace: "cut-up",
		pieces,
		reason: `cut up into lot ${to.code}`,
	} as const
	stock.moves.push(moveOf(season, off, offAt), moveOf(season, cut, at))
}

function lossGrams(cut: {
	section: CatalogueProduct
	pieces: number
	made: CatalogueProduct
	piecesMade: number
}): number {
	const ounces = cut.pieces * cut.section.netOunces - cut.piecesMade * cut.made.netOunces
	return Math.max(0, Math.round((ounces * 28_349_523) / 1_000_000))
}

function link(
	{ producerId, chance }: Season,
	plan: Regrouping,
	row: Omit<Regrouping["links"][number], "producerId" | "id">,
): void {
	plan.links.push({ producerId, id: chance.id(), ...row })
	plan.madeFromLots.add(row.toLotId)
	if (row.kind === "split") plan.splitOff.add(row.toLotId)
}

function moveOf(
	{ producerId, chance, scenario, userId }: Season,
	row: Pick<Move, "lotId" | "fromPlace" | "toPlace" | "toRef" | "pieces" | "reason">,
	movedAt: Date,
): Move {
	return { producerId, id: chance.id(), movedAt, movedBy: userId(scenario.packerEmail), ...row }
}

/** The code after the last of the same product: lots are counted up behind their letter. */
function nextCode(stock: Stock, like: { productId: string; code: string }): string {
	const count = stock.lots.filter((lot) => lot.productId === like.productId).length
	return `${like.code.slice(0, 1)}${String(count + 1).padStart(2, "0")}`
}
