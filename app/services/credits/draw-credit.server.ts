import { findCredit } from "./find-credit.server"

/** The PDF of a credit as it stands now, by its printed number. With `storeId` it must be that store's. Null when there is none. */
export async function drawCredit(query: {
	producerId: string
	storeId?: string
	number: string
}): Promise<Uint8Array<ArrayBuffer> | null> {
	const credit = await findCredit(query)
	if (!credit) return null
	// The drawing of PDFs takes a second to load, so that no other page should wait for it.
	const { renderCreditPdf } = await import("~emails/documents/credit")
	return new Uint8Array(await renderCreditPdf(credit))
}
