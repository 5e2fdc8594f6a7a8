import { sql } from "drizzle-orm"
import { readProducer, withProducer } from "~/db/transaction.server"
import { readLotCodePattern } from "~/domain/lots/lot-code"
import type { Result } from "~/domain/result"

export type LotSettings = { lotCodePattern: string; bestBeforeDays: number }

/** How lots are named, and how long they keep. */
export function findLotSettings(producerId: string): Promise<LotSettings> {
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<LotSettings>(sql`
			select lot_code_pattern as "lotCodePattern", best_before_days as "bestBeforeDays"
			from producer_settings where producer_id = ${producerId}`)
		return rows[0] ?? { lotCodePattern: "{product}{yy}-{nnn}", bestBeforeDays: 300 }
	})
}

/** Changes how new lots are named and how long they keep. Refuses, in a sentence, what `readLotCodePattern` refuses. */
export function saveLotSettings(
	query: LotSettings & { producerId: string },
): Promise<Result<object, { ok: false; reason: string; message: string }>> {
	const { producerId, bestBeforeDays } = query
	return withProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ code: string }>(sql`
			select code from products where producer_id = ${producerId} order by length(code) desc limit 1`)
		const read = readLotCodePattern(query.lotCodePattern, { longestProductCode: rows[0]?.code ?? "" })
		if (!read.ok) return read
		await tx.execute(sql`
			update producer_settings set lot_code_pattern = ${read.pattern}, best_before_days = ${bestBeforeDays}
			where producer_id = ${producerId}`)
		return { ok: true } as const
	})
}
