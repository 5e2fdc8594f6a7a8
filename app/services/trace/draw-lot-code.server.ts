import { toString as drawCode } from "qrcode"
import { env } from "~/platform/env.server"

/** The public address of a lot's page. */
export function lotAddress(lot: { producerSlug: string; code: string }): string {
	return `${env.BASE_URL}/shop/${lot.producerSlug}/lots/${encodeURIComponent(lot.code)}`
}

/**
 * The public address of a lot as a QR code: an SVG with the quiet zone of four modules that the standard asks for, readable
 * with a seventh of it lost (level M). Source: ISO/IEC 18004.
 */
export function drawLotCode(lot: { producerSlug: string; code: string }): Promise<string> {
	return drawCode(lotAddress(lot), { type: "svg", errorCorrectionLevel: "M", margin: 4 })
}
