import { pool } from "./client.server"

/**
 * What a producer's public shop goes by at this moment: the version that rises with every change it shows, and the day
 * in the producer's zone. Null where there is no such producer. One statement on its own: it stands before every
 * answer of the shop.
 */
export async function shopStamp(producerSlug: string): Promise<string | null> {
	const { rows } = await pool().query<{ stamp: string | null }>({
		name: "shop_stamp",
		text: "select shop_stamp($1) as stamp",
		values: [producerSlug],
	})
	return rows[0]?.stamp ?? null
}
