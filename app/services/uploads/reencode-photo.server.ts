import type { Result } from "~/domain/result"

/** The most that a photo may weigh when it comes in. */
export const PHOTO_BYTES = 10_000_000

/** More pixels than this are not opened: a small file can unfold to more than there is room for. */
const MOST_PIXELS = 64_000_000
const LONGEST_SIDE = 1_600
/** What a kept photo should weigh at most; the worst quality is taken where even that is more. */
const KEPT_BYTES = 300_000
const QUALITIES = [82, 70, 58, 45] as const
const FORMATS: readonly (string | undefined)[] = ["jpeg", "png", "webp"]

/** A photo as it is kept: a JPEG without whatever the camera wrote beside the picture. */
export type KeptPhoto = { mediaType: "image/jpeg"; content: Buffer; width: number; height: number }

export type PhotoRefusal = "photo-too-heavy" | "photo-of-other-type" | "photo-too-many-pixels" | "photo-not-readable"

/**
 * Draws a photo anew so that it can be kept: upright, at most 1,600 pixels on its longer side and about 300 kB, and without
 * the place and time that a phone writes into it. What it is, its content alone says, whatever its name. Refuses what
 * weighs more than 10 MB, is no JPEG, PNG or WebP, has more than 64 million pixels, or cannot be read to its end.
 */
export async function reencodePhoto(
	bytes: Uint8Array,
): Promise<Result<{ photo: KeptPhoto }, { ok: false; reason: PhotoRefusal }>> {
	if (bytes.byteLength > PHOTO_BYTES) return { ok: false, reason: "photo-too-heavy" }
	// Loaded when the first photo comes: it is large, and most processes never need it.
	const { default: sharp } = await import("sharp")
	const facts = await sharp(bytes, { limitInputPixels: false })
		.metadata()
		.catch(() => null)
	if (!facts || !FORMATS.includes(facts.format)) return { ok: false, reason: "photo-of-other-type" }
	if (facts.width * facts.height > MOST_PIXELS) return { ok: false, reason: "photo-too-many-pixels" }
	try {
		const { data, info } = await sharp(bytes, { limitInputPixels: MOST_PIXELS, failOn: "error" })
			.autoOrient()
			.resize(LONGEST_SIDE, LONGEST_SIDE, { fit: "inside", withoutEnlargement: true })
			.flatten({ background: "#ffffff" })
			.toColourspace("srgb")
			.raw()
			.toBuffer({ resolveWithObject: true })
		const { width, height, channels } = info
		let content = data
		for (const quality of QUALITIES) {
			content = await sharp(data, { raw: { width, height, channels } }).jpeg({ quality, mozjpeg: true }).toBuffer()
			if (content.byteLength <= KEPT_BYTES) break
		}
		return { ok: true, photo: { mediaType: "image/jpeg", content, width, height } }
	} catch {
		return { ok: false, reason: "photo-not-readable" }
	}
}
