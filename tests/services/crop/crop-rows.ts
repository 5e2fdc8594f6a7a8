import { randomUUID } from "node:crypto"
import { hives, superChecks, supers, yards } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Yard } from "../orders/place-yard"

/** A yard with so many hives, labelled from 1; returns their ids in that order. */
export async function addHives(
	yard: Yard,
	given: { count: number; name?: string; flora?: string; from?: number },
): Promise<{ yardId: string; hiveIds: string[] }> {
	const { producerId } = yard
	const { count, name = "Home yard", flora = "white clover", from = 1 } = given
	const yardId = randomUUID()
	const hiveIds = Array.from({ length: count }, () => randomUUID())
	await withProducer(producerId, async (tx) => {
		await tx.insert(yards).values({ producerId, id: yardId, name, flora })
		if (count > 0) {
			await tx
				.insert(hives)
				.values(hiveIds.map((id, index) => ({ producerId, id, yardId, label: String(from + index) })))
		}
	})
	return { yardId, hiveIds }
}

type Look = { on: Day; filled: number; capped: number; sections?: string }

/** A super of 40 sections with its checks, on the hive unless `off` says when it came off and with what. */
export async function addSuper(
	yard: Yard,
	given: {
		hiveId: string
		productId: string
		setOn?: Day
		level?: number
		looks?: readonly Look[]
		off?: { on: Day; finished: number | null }
	},
): Promise<string> {
	const { producerId } = yard
	const { hiveId, productId, setOn = "2026-07-10", level = 1, looks = [], off } = given
	const id = randomUUID()
	await withProducer(producerId, async (tx) => {
		await tx.insert(supers).values({
			producerId,
			id,
			hiveId,
			productId,
			setOn,
			level,
			...(off ? { state: "off" as const, offOn: off.on, finishedPieces: off.finished } : {}),
		})
		if (looks.length === 0) return
		await tx.insert(superChecks).values(
			looks.map((look) => ({
				producerId,
				id: randomUUID(),
				superId: id,
				checkedOn: look.on,
				filledPercent: look.filled,
				cappedPercent: look.capped,
				sections: look.sections ?? "",
			})),
		)
	})
	return id
}
