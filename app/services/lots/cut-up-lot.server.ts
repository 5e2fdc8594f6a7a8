import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { CUT_FORMS, combGrams, cutUpLoss } from "~/domain/lots/regroup"
import { likelyReleaseOn } from "~/domain/lots/release-day"
import { allOf, type RegroupAnswer, type RegroupQuery, refuseRegroup, regroup } from "./regroup-lots.server"

export type CutUpLot = RegroupQuery & {
	code: string
	pieces: number
	/** What these pieces weigh together, in grams; null takes their labelled weight. */
	gramsIn: number | null
	/** The product they are cut into, and how many pieces of it were made. */
	intoProductId: string
	piecesMade: number
	today: Day
}

/**
 * Cuts pieces of a lot up into another product. The new lot is held, as it is weighed and packed anew, and what went in and
 * came out as neither is kept as its loss. Refuses more pieces than lie on the shelves, a product that is not cut, more
 * comb out than went in, and a withdrawn lot or one past its best before.
 */
export function cutUpLot(query: CutUpLot): Promise<RegroupAnswer> {
	const { code, pieces, piecesMade, today } = query
	return regroup({ ...query, codes: [code] }, async (tx, [lot]) => {
		if (!lot) return refuseRegroup("This lot is not there any more.")
		if (lot.state === "withdrawn") return refuseRegroup("A withdrawn lot stays as it is.")
		if (lot.bestBeforeOn < today)
			return refuseRegroup("This lot is past its best before, and so would be what is cut of it.")
		const there = allOf(lot.shelves)
		if (pieces > there) return refuseRegroup(`Only ${there} pieces of this lot are on the shelves.`, "pieces")
		const into = await findCutProduct(tx, query)
		if (!into || into.id === lot.productId) return refuseRegroup("Choose a product of the list.", "into")
		const loss = cutUpLoss({
			gramsIn: query.gramsIn ?? pieces * lot.pieceNetGrams,
			piecesMade,
			combGramsEach: combGrams(into),
		})
		if (loss === null) {
			return refuseRegroup("That is more comb than went in. Weigh what goes in, or write fewer pieces made.", "made")
		}
		const ready = Math.min(pieces, lot.shelves.ready)
		const { harvestedOn, bestBeforeOn, yard, flora, moistureTenths, pfundTenths } = lot
		return {
			ok: true,
			kind: "cut-up",
			taken: [{ from: lot, pieces: { ready, "cold-room": pieces - ready }, piecesMade }],
			becomes: {
				productId: into.id,
				harvestedOn,
				bestBeforeOn,
				expectedReleaseOn: likelyReleaseOn(today, bestBeforeOn),
				yard,
				flora,
				grade: "",
				moistureTenths,
				pfundTenths,
			},
			productCode: into.code,
			isReleased: false,
			lossGrams: loss,
			reason: `cut from lot ${lot.code}`,
		}
	})
}

async function findCutProduct(tx: Tx, { producerId, intoProductId }: CutUpLot) {
	const { rows } = await tx.execute<{ id: string; code: string; form: string; pieceNetGrams: number }>(sql`
		select id, code, form, piece_net_grams as "pieceNetGrams" from products
		where producer_id = ${producerId} and id = ${intoProductId} and is_active
			and form = any(${sql.param([...CUT_FORMS])}::text[])`)
	return rows[0] ?? null
}
