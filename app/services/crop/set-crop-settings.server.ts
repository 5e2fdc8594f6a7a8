import { eq } from "drizzle-orm"
import { auditEntries, producerSettings } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { CropFigure } from "~/domain/crop/board"
import { refreshExpected } from "./refresh-expected.server"

/**
 * Sets the capped share (1 to 100 %) at which a super is ready, and which figure of the crop counts as supply. What should
 * come off is worked out anew, since days follow the ready share.
 */
export async function setCropSettings(given: {
	producerId: string
	personId: string
	today: Day
	readyCappedPercent: number
	figure: CropFigure
}): Promise<void> {
	const { producerId, personId, today, readyCappedPercent, figure } = given
	await withProducer(producerId, async (tx) => {
		await tx
			.update(producerSettings)
			.set({ readyCappedPercent, cropFigure: figure })
			.where(eq(producerSettings.producerId, producerId))
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "crop settings changed",
			subjectType: "producer",
			subjectId: producerId,
			detail: { readyCappedPercent, figure },
		})
		await refreshExpected(tx, { producerId, today })
	})
}
