import { data } from "react-router"
import { z } from "zod"
import { findBreakagePhoto } from "~/services/breakage/find-breakage-photo.server"
import { admits, guard } from "../guard.server"
import { photoFile } from "../photo-file"
import type { Route } from "./+types/breakage-photo"

/** A photo of a report, for the desk. */
export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, { producer }) => {
	const id = z.guid().safeParse(params.picture)
	const photo = id.success ? await findBreakagePhoto({ producerId: producer.id, photoId: id.data }) : null
	if (!photo) throw data(null, { status: 404 })
	return photoFile(photo)
})
