import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"
import { type GradeScheme, UNGRADED } from "~/domain/grading/grade-comb"
import { CULLS } from "~/domain/lots/count-harvest"
import { likelyReleaseOn } from "~/domain/lots/release-day"
import { type ListedScheme, readSchemes, schemesFor } from "~/services/lots/read-schemes.server"
import { type HarvestSuper, readSupers } from "./read-supers.server"

/** One product of the chosen supers, with the names under which its pieces can be counted. */
export type HarvestProduct = {
	productId: string
	name: string
	detail: string
	grades: string[]
	flora: string
	bestBeforeOn: Day
	expectedReleaseOn: Day
	supers: HarvestSuper[]
}

const MOST_GRADES = 5

/** The yards with supers on hives, and those supers: of one yard where it is named. */
export function findSupersToTakeOff(query: {
	producerId: string
	yardId: string | null
}): Promise<{ yards: { id: string; name: string }[]; supers: HarvestSuper[] }> {
	const { producerId, yardId } = query
	return readProducer(producerId, async (tx) => {
		const { rows: yards } = await tx.execute<{ id: string; name: string }>(sql`
			select y.id, y.name from yards y
			where y.producer_id = ${producerId} and exists (
				select from hives h join supers s on s.producer_id = h.producer_id and s.hive_id = h.id and s.state <> 'off'
				where h.producer_id = y.producer_id and h.yard_id = y.id)
			order by y.name`)
		return { yards, supers: await readSupers(tx, { producerId, yardId }) }
	})
}

/** The chosen supers by product, with grades to count by and proposals. Those that are not on a hive are left out. */
export function findChosenSupers(query: {
	producerId: string
	superIds: readonly string[]
	harvestedOn: Day
}): Promise<HarvestProduct[]> {
	const { producerId, superIds, harvestedOn } = query
	return readProducer(producerId, async (tx) => {
		const supers = await readSupers(tx, { producerId, ids: superIds })
		const schemes = await readSchemes(tx, producerId)
		const { rows } = await tx.execute<{ days: number }>(
			sql`select best_before_days as days from producer_settings where producer_id = ${producerId}`,
		)
		const bestBeforeOn = addDays(harvestedOn, rows[0]?.days ?? 300)
		const products = new Map<string, HarvestProduct>()
		for (const one of supers) {
			const product = products.get(one.productId) ?? {
				productId: one.productId,
				name: one.productName,
				detail: one.productDetail,
				grades: gradesOf(schemesFor(schemes, one.productForm)),
				flora: one.flora,
				bestBeforeOn,
				expectedReleaseOn: likelyReleaseOn(harvestedOn, bestBeforeOn),
				supers: [],
			}
			product.supers.push(one)
			products.set(one.productId, product)
		}
		return [...products.values()]
	})
}

function gradesOf(schemes: readonly ListedScheme[]): string[] {
	const scheme: GradeScheme | undefined = schemes[0]?.scheme
	return [...(scheme?.grades.slice(0, MOST_GRADES).map(({ name }) => name) ?? []), UNGRADED, CULLS]
}
