import { type Day, daysBetween } from "~/domain/calendar"

/** The most that a certificate's file may weigh: 10 MB. */
export const CERTIFICATE_BYTES = 10_485_760

const SIGNATURES = [
	{ type: "application/pdf", at: 0, bytes: [0x25, 0x50, 0x44, 0x46, 0x2d] },
	{ type: "image/jpeg", at: 0, bytes: [0xff, 0xd8, 0xff] },
	{ type: "image/png", at: 0, bytes: [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a] },
	{ type: "image/webp", at: 8, bytes: [0x57, 0x45, 0x42, 0x50] },
] as const

export type CertificateType = (typeof SIGNATURES)[number]["type"]

/**
 * What a file is by its first bytes, whatever its name says: a PDF, JPEG, PNG or WebP; null for anything else. Sources, all
 * from memory, high: ISO 32000-1, 7.5.2 (%PDF-); ITU-T T.81, B.1.1.3 (SOI); PNG, 5.2; RFC 9649, 2.3 (RIFF….WEBP).
 */
export function certificateType(bytes: Uint8Array): CertificateType | null {
	const found = SIGNATURES.find((one) => one.bytes.every((byte, index) => bytes[one.at + index] === byte))
	if (found?.type === "image/webp" && String.fromCharCode(...bytes.subarray(0, 4)) !== "RIFF") return null
	return found?.type ?? null
}

/** The ending a file of that type is saved under. */
export const CERTIFICATE_ENDINGS: Record<CertificateType, string> = {
	"application/pdf": "pdf",
	"image/jpeg": "jpg",
	"image/png": "png",
	"image/webp": "webp",
}

/** A store is told so many days before its certificate runs out. This product's own choice. */
export const CERTIFICATE_NOTICE_DAYS = [7, 30] as const

/** Which notice of the end of a certificate is due on `today`: the one of 30 days, of 7, or none yet or any more. */
export function certificateNotice(validUntil: Day, today: Day): (typeof CERTIFICATE_NOTICE_DAYS)[number] | null {
	const left = daysBetween(today, validUntil)
	return left < 0 ? null : (CERTIFICATE_NOTICE_DAYS.find((days) => left <= days) ?? null)
}
