import { data } from "react-router"
import { drawCredit } from "~/services/credits/draw-credit.server"
import { admits, guard } from "../guard.server"
import { pdfFile } from "../pdf-file"
import type { Route } from "./+types/credit-pdf"

/** The printed page of a store's credit. */
export const loader = guard(
	admits.store("buyer", "payer"),
	async ({ params }: Route.LoaderArgs, { producer, store }) => {
		const pdf = await drawCredit({ producerId: producer.id, storeId: store.id, number: params.credit })
		if (!pdf) throw data(null, { status: 404 })
		return pdfFile(pdf, `credit-${params.credit}.pdf`)
	},
)
