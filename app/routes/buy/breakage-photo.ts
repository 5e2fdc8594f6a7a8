import { data } from "react-router"
import { z } from "zod"
import { findBreakagePhoto } from "~/services/breakage/find-breakage-photo.server"
import { admits, guard } from "../guard.server"
import { photoFile } from "../photo-file"
import type { Route } from "./+types/breakage-photo"

/** A photo of a report, for the people of the store that made it. */
export const loader = guard(
	admits.store("buyer", "payer"),
	async ({ params }: Route.LoaderArgs, { producer, store }) => {
		const id = z.guid().safeParse(params.picture)
		const query = { producerId: producer.id, storeId: store.id }
		const photo = id.success ? await findBreakagePhoto({ ...query, photoId: id.data }) : null
		if (!photo) throw data(null, { status: 404 })
		return photoFile(photo)
	},
)
