import { data } from "react-router"
import { drawInvoice } from "~/services/invoicing/draw-invoice.server"
import { admits, guard } from "../guard.server"
import { pdfFile } from "../pdf-file"
import type { Route } from "./+types/invoice-pdf"

/** The printed page of any of the producer's invoices. */
export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, { producer }) => {
	const pdf = await drawInvoice({ producerId: producer.id, number: params.invoice })
	if (!pdf) throw data(null, { status: 404 })
	return pdfFile(pdf, `invoice-${params.invoice}.pdf`)
})
