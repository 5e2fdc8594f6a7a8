import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { harvests } from "~/db/schema"
import { readProducer, type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { type HarvestProblem, type PlannedProduct, planHarvest, type WrittenHarvest } from "~/domain/lots/plan-harvest"
import type { Result } from "~/domain/result"
import { refreshExpected } from "~/services/crop/refresh-expected.server"
import { type LotToName, proposeLotCodes, takeLotCodes } from "~/services/lots/take-lot-codes.server"
import { type NewLot, writeLots } from "~/services/lots/write-lots.server"
import { type HarvestSuper, readSupers } from "./read-supers.server"

export type BringInHarvest = WrittenHarvest & {
	producerId: string
	personId: string
	today: Day
	note: string
	/** Made with the form: a second send finds what the first brought in. */
	idempotencyKey: string
}

type Problems = { ok: false; reason: "problems"; problems: HarvestProblem[] }

const superIdsOf = (harvest: WrittenHarvest) => harvest.products.flatMap(({ supers }) => supers.map(({ id }) => id))

/** A product of a harvest as it would be brought in, with the codes that its lots would get. */
export type LookedAt = PlannedProduct & { proposedCodes: string[] }

/** What a harvest would become, without bringing it in; refuses as `bringInHarvest` does, but for codes that are taken. */
export function lookAtHarvest(
	harvest: WrittenHarvest & { producerId: string; today: Day },
): Promise<Result<{ products: LookedAt[] }, Problems>> {
	const { producerId, today, harvestedOn } = harvest
	return readProducer(producerId, async (tx) => {
		const supers = await readSupers(tx, { producerId, ids: superIdsOf(harvest) })
		const plan = planHarvest(harvest, { supers, today })
		if (!plan.ok) return plan
		const lots = lotsToName(plan.products, supers)
		const codes = (await proposeLotCodes(tx, { producerId, harvestedOn, lots })).values()
		const products = plan.products.map((product) => ({
			...product,
			proposedCodes: product.lots.map(() => codes.next().value ?? ""),
		}))
		return { ok: true, products }
	})
}

/** The lots of a plan, in its order, as their codes are made. */
function lotsToName(products: readonly PlannedProduct[], supers: readonly HarvestSuper[]): LotToName[] {
	const productCodes = new Map(supers.map(({ productId, productCode }) => [productId, productCode]))
	return products.flatMap(({ productId, lots }) =>
		lots.map(({ code }) => ({ productCode: productCodes.get(productId) ?? "", code })),
	)
}

/**
 * Brings supers in, in one transaction: the harvest, a held lot for each product and grade with its pieces in the cold
 * room, the supers set off with their finished pieces, and what is still expected worked out anew. Refuses, naming each
 * problem, what `planHarvest` refuses, and a lot code that another lot has; nothing is written then. Sending the same form
 * again answers the first harvest.
 */
export async function bringInHarvest(harvest: BringInHarvest): Promise<Result<{ harvestId: string }, Problems>> {
	try {
		return await withProducer(harvest.producerId, (tx) => bringIn(tx, harvest))
	} catch (error) {
		// Two sends of one form at once meet at its key; the second then finds what the first brought in.
		if (breaksConstraint(error, "harvests_sent_once")) return bringInHarvest(harvest)
		if (error instanceof CodeTaken) return { ok: false, reason: "problems", problems: [error.problem] }
		throw error
	}
}

async function bringIn(tx: Tx, harvest: BringInHarvest): Promise<Result<{ harvestId: string }, Problems>> {
	const { producerId, personId, today, harvestedOn, note, idempotencyKey } = harvest
	const supers = await readSupers(tx, { producerId, ids: superIdsOf(harvest), lock: true })
	const earlier = await findByKey(tx, { producerId, idempotencyKey })
	if (earlier) return { ok: true, harvestId: earlier }
	const plan = planHarvest(harvest, { supers, today })
	if (!plan.ok) return plan

	const harvestId = randomUUID()
	await tx
		.insert(harvests)
		.values({ producerId, id: harvestId, harvestedOn, note, enteredBy: personId, idempotencyKey })
	await setOff(tx, { producerId, harvestId, harvestedOn, products: plan.products })
	await refreshExpected(tx, { producerId, today, productIds: plan.products.map(({ productId }) => productId) })

	const planned = plan.products.flatMap((product) => product.lots.map((lot) => ({ product, lot })))
	const named = await takeLotCodes(tx, { producerId, harvestedOn, lots: lotsToName(plan.products, supers) })
	if ("taken" in named) throw new CodeTaken(named.taken, plan.products)
	const lots = planned.map(({ product, lot }, index): NewLot => {
		const { lots: _, finished, ...facts } = product
		const from = supers.filter(({ id }) => finished.some(({ superId }) => superId === id))
		const code = named.codes[index] as string
		return {
			...facts,
			...lot,
			id: randomUUID(),
			code,
			harvestedOn,
			yard: yardWords(from),
			harvestId,
			reason: "off the hives",
		}
	})
	await writeLots(tx, { producerId, personId, lots })
	return { ok: true, harvestId }
}

const yardWords = (supers: readonly HarvestSuper[]) => [...new Set(supers.map(({ yardName }) => yardName))].join(", ")

/** Undoes the harvest when a lot code that was typed is another lot's. */
class CodeTaken extends Error {
	readonly problem: HarvestProblem
	constructor(code: string, products: readonly PlannedProduct[]) {
		super(`lot code ${code} is taken`)
		const whose = products
			.flatMap(({ productId, lots }) => lots.map((lot) => ({ productId, ...lot })))
			.find((lot) => lot.code === code)
		this.problem = {
			at: whose ? { productId: whose.productId, part: `code-${whose.grade}` } : null,
			message: `Lot ${code} is there already. Write another code, or leave it empty.`,
		}
	}
}

async function findByKey(tx: Tx, query: { producerId: string; idempotencyKey: string }): Promise<string | null> {
	const { rows } = await tx.execute<{ id: string }>(sql`
		select id from harvests where producer_id = ${query.producerId} and idempotency_key = ${query.idempotencyKey}`)
	return rows[0]?.id ?? null
}

async function setOff(
	tx: Tx,
	harvest: { producerId: string; harvestId: string; harvestedOn: Day; products: readonly PlannedProduct[] },
): Promise<void> {
	const finished = harvest.products.flatMap((product) => product.finished)
	await tx.execute(sql`
		update supers s
		set state = 'off', off_on = ${harvest.harvestedOn}, harvest_id = ${harvest.harvestId}, finished_pieces = f.pieces,
			clearing_on = least(s.clearing_on, ${harvest.harvestedOn}::date)
		from json_to_recordset(${JSON.stringify(finished)}::json) as f("superId" uuid, pieces smallint)
		where s.producer_id = ${harvest.producerId} and s.id = f."superId"`)
}
