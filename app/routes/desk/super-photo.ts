import { data } from "react-router"
import { z } from "zod"
import { findPhoto } from "~/services/crop/find-photo.server"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/super-photo"

/** A photo of a check, for the producer's people alone. That it is private and its type as told, every answer says. */
export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params }: Route.LoaderArgs, { producer }) => {
		const id = z.guid().safeParse(params.photo)
		const photo = id.success ? await findPhoto({ producerId: producer.id, photoId: id.data }) : null
		if (!photo) throw data(null, { status: 404 })
		return new Response(new Uint8Array(photo.content), {
			headers: {
				"Content-Type": photo.mediaType,
				"Content-Disposition": "inline",
				"Content-Security-Policy": "default-src 'none'; frame-ancestors 'none'",
			},
		})
	},
)
