import { data } from "react-router"
import { drawPackingSlip } from "~/services/orders/draw-packing-slip.server"
import { admits, guard } from "../guard.server"
import { pdfFile } from "../pdf-file"
import type { Route } from "./+types/packing-slip-pdf"

/** The printed page of a packed order's slip. */
export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params }: Route.LoaderArgs, { producer }) => {
		const number = /^[1-9]\d{0,8}$/.test(params.number) ? Number(params.number) : null
		const pdf = number === null ? null : await drawPackingSlip({ producerId: producer.id, number })
		if (!pdf) throw data(null, { status: 404 })
		return pdfFile(pdf, `packing-slip-${number}.pdf`)
	},
)
