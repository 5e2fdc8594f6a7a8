import { data } from "react-router"
import { writeInvoiceUbl } from "~/services/invoicing/write-invoice-ubl.server"
import { admits, guard } from "../guard.server"
import { xmlFileAnswer } from "../xml-file"
import type { Route } from "./+types/invoice-ubl"

/** A store's invoice as a UBL file. */
export const loader = guard(
	admits.store("buyer", "payer"),
	async ({ params }: Route.LoaderArgs, { producer, store }) => {
		const xml = await writeInvoiceUbl({ producerId: producer.id, storeId: store.id, number: params.invoice })
		if (xml === null) throw data(null, { status: 404 })
		return xmlFileAnswer(xml, `invoice-${params.invoice}.xml`)
	},
)
