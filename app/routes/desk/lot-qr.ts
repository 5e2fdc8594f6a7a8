import { data } from "react-router"
import { drawLotCode } from "~/services/trace/draw-lot-code.server"
import { findPublicLot } from "~/services/trace/find-public-lot.server"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/lot-qr"

/** The code on the label: the address of the lot's public page, as a drawing. */
export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params }: Route.LoaderArgs, { producer }) => {
		const lot = await findPublicLot({ producerId: producer.id, code: params.code })
		if (!lot) throw data(null, { status: 404 })
		const svg = await drawLotCode({ producerSlug: producer.slug, code: lot.code })
		return new Response(svg, { headers: { "Content-Type": "image/svg+xml", "Cache-Control": "private, max-age=3600" } })
	},
)
