import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { hives, supers, yards } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { TypedCheck } from "~/domain/crop/check-rules"
import { recordCheck } from "~/services/crop/record-check.server"
import { addHand } from "../desk/desk-steps"
import { addProduct, openYard, THURSDAY, ZONE } from "../orders/place-yard"

/** A yard of a new producer with one hive, one super of 40 set on July 1, and someone who looks into it. */
export async function openBeeYard() {
	const yard = await openYard()
	const { producerId } = yard
	const productId = await addProduct(yard, { code: "11", readyCases: 0 })
	const [yardId, hiveId, superId] = [randomUUID(), randomUUID(), randomUUID()]
	await withProducer(producerId, async (tx) => {
		await tx.insert(yards).values({ producerId, id: yardId, name: "Weld Farm", flora: "sainfoin" })
		await tx.insert(hives).values({ producerId, id: hiveId, yardId, label: "7" })
		await tx.insert(supers).values({ producerId, id: superId, hiveId, productId, setOn: "2026-07-01" })
	})
	return { producerId, yardId, hiveId, superId, productId, personId: await addHand() }
}

export type BeeYard = Awaited<ReturnType<typeof openBeeYard>>

/** A check by shares, made today. */
const TYPED: TypedCheck = {
	by: "shares",
	rows: ["", "", "", ""],
	filled: "60",
	capped: "20",
	note: "",
	checkedOn: "2026-08-13",
}

/** Records a check of the yard's super; whatever is not given is usual. */
export function look(
	yard: BeeYard,
	typed: Partial<TypedCheck> = {},
	given: Partial<Parameters<typeof recordCheck>[0]> = {},
) {
	return recordCheck({
		producerId: yard.producerId,
		personId: yard.personId,
		zone: ZONE,
		now: THURSDAY,
		checkId: randomUUID(),
		superId: yard.superId,
		photo: null,
		...given,
		typed: { ...TYPED, ...typed },
	})
}

/** How many rows of a table the producer has. */
export async function countOf(yard: BeeYard, table: "super_checks" | "uploads"): Promise<number> {
	const { rows } = await withProducer(yard.producerId, (tx) =>
		tx.execute<{ count: number }>(
			sql`select count(*)::int as count from ${sql.identifier(table)} where producer_id = ${yard.producerId}`,
		),
	)
	return rows[0]?.count ?? -1
}

/** Takes the yard's super off on a day. */
export async function takeOff(yard: BeeYard, offOn: string): Promise<void> {
	await withProducer(yard.producerId, (tx) =>
		tx.execute(sql`update supers set state = 'off', off_on = ${offOn}
			where producer_id = ${yard.producerId} and id = ${yard.superId}`),
	)
}
