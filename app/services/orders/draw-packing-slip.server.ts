import { findPackingSlip } from "./find-packing-slip.server"

/** The PDF of a packed order's slip, by the order's number. Null when there is none. */
export async function drawPackingSlip(query: {
	producerId: string
	number: number
}): Promise<Uint8Array<ArrayBuffer> | null> {
	const slip = await findPackingSlip(query)
	if (!slip) return null
	// The drawing of PDFs takes a second to load, so that no other page should wait for it.
	const { renderPackingSlipPdf } = await import("~emails/documents/packing-slip")
	return new Uint8Array(await renderPackingSlipPdf(slip))
}
