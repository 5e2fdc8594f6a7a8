import { data } from "react-router"
import { writeInvoiceUbl } from "~/services/invoicing/write-invoice-ubl.server"
import { admits, guard } from "../guard.server"
import { xmlFileAnswer } from "../xml-file"
import type { Route } from "./+types/invoice-ubl"

/** Any of the producer's invoices as a UBL file. */
export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, { producer }) => {
	const xml = await writeInvoiceUbl({ producerId: producer.id, number: params.invoice })
	if (xml === null) throw data(null, { status: 404 })
	return xmlFileAnswer(xml, `invoice-${params.invoice}.xml`)
})
