import { and, eq } from "drizzle-orm"
import { uploads } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"

/** A photo that was kept with a check, or null. */
export function findPhoto(query: { producerId: string; photoId: string }) {
	const { producerId, photoId } = query
	return readProducer(producerId, async (tx) => {
		const [photo] = await tx
			.select({ mediaType: uploads.mediaType, content: uploads.content })
			.from(uploads)
			.where(and(eq(uploads.producerId, producerId), eq(uploads.id, photoId)))
		return photo ?? null
	})
}
