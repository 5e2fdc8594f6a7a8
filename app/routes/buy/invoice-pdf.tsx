import { data } from "react-router"
import { drawInvoice } from "~/services/invoicing/draw-invoice.server"
import { admits, guard } from "../guard.server"
import { pdfFile } from "../pdf-file"
import type { Route } from "./+types/invoice-pdf"

/** The printed page of a store's invoice. */
export const loader = guard(
	admits.store("buyer", "payer"),
	async ({ params }: Route.LoaderArgs, { producer, store }) => {
		const pdf = await drawInvoice({ producerId: producer.id, storeId: store.id, number: params.invoice })
		if (!pdf) throw data(null, { status: 404 })
		return pdfFile(pdf, `invoice-${params.invoice}.pdf`)
	},
)
