import { data } from "react-router"
import { drawCredit } from "~/services/credits/draw-credit.server"
import { admits, guard } from "../guard.server"
import { pdfFile } from "../pdf-file"
import type { Route } from "./+types/credit-pdf"

/** The printed page of any of the producer's credits. */
export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, { producer }) => {
	const pdf = await drawCredit({ producerId: producer.id, number: params.credit })
	if (!pdf) throw data(null, { status: 404 })
	return pdfFile(pdf, `credit-${params.credit}.pdf`)
})
