import sharp from "sharp"
import { describe, expect, it } from "vitest"
import { PHOTO_BYTES, reencodePhoto } from "~/services/uploads/reencode-photo.server"

/** A picture of coloured noise, which no format can make small. */
function noise(width: number, height: number) {
	const pixels = Buffer.alloc(width * height * 3)
	for (let i = 0, seed = 1; i < pixels.length; i++) {
		seed = (seed * 1_103_515_245 + 12_345) % 2_147_483_648
		pixels[i] = seed >> 16
	}
	return sharp(pixels, { raw: { width, height, channels: 3 } })
}

describe("a photo from the yard", () => {
	it("is kept as a JPEG of at most 1,600 pixels, whichever of the three formats it came in", async () => {
		const picture = sharp({ create: { width: 3000, height: 2000, channels: 3, background: "#c80" } })
		for (const bytes of [
			await picture.clone().jpeg().toBuffer(),
			await picture.clone().png().toBuffer(),
			await picture.clone().webp().toBuffer(),
		]) {
			const kept = await reencodePhoto(bytes)
			expect(kept).toMatchObject({ ok: true, photo: { mediaType: "image/jpeg", width: 1600, height: 1067 } })
			if (kept.ok) expect((await sharp(kept.photo.content).metadata()).format).toBe("jpeg")
		}
	})

	it("is turned upright and tells neither where nor when it was taken", async () => {
		const taken = await sharp({ create: { width: 60, height: 40, channels: 3, background: "#c80" } })
			.withExif({ IFD0: { Make: "A phone" }, IFD3: { GPSLatitude: "51/1 30/1 0/1" } })
			.withMetadata({ orientation: 6 })
			.jpeg()
			.toBuffer()
		expect((await sharp(taken).metadata()).exif).toBeDefined()
		const kept = await reencodePhoto(taken)
		if (!kept.ok) throw new Error(kept.reason)
		expect([kept.photo.width, kept.photo.height]).toEqual([40, 60])
		const { exif, orientation } = await sharp(kept.photo.content).metadata()
		expect([exif, orientation]).toEqual([undefined, undefined])
	})

	it("grows coarser rather than heavy", async () => {
		const kept = await reencodePhoto(await noise(1400, 1000).jpeg({ quality: 95 }).toBuffer())
		if (!kept.ok) throw new Error(kept.reason)
		const plain = await noise(1400, 1000).jpeg({ quality: 82, mozjpeg: true }).toBuffer()
		expect(kept.photo.content.byteLength).toBeLessThan(plain.byteLength)
	})

	it("is refused by what it is, not by its name: a drawing, a GIF, words, half a picture", async () => {
		const picture = sharp({ create: { width: 300, height: 200, channels: 3, background: "#c80" } })
		const whole = await noise(300, 200).jpeg().toBuffer()
		const reasonOf = async (bytes: Uint8Array) => {
			const kept = await reencodePhoto(bytes)
			return kept.ok ? "kept" : kept.reason
		}
		const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="9" height="9"><path d="M0 0h9v9z"/></svg>`
		expect(await reasonOf(Buffer.from(svg))).toBe("photo-of-other-type")
		expect(await reasonOf(await picture.clone().gif().toBuffer())).toBe("photo-of-other-type")
		expect(await reasonOf(Buffer.from("not a picture"))).toBe("photo-of-other-type")
		expect(await reasonOf(whole.subarray(0, whole.length / 2))).toBe("photo-not-readable")
		expect(await reasonOf(Buffer.alloc(PHOTO_BYTES + 1))).toBe("photo-too-heavy")
	})

	it("is refused when a small file would unfold to too many pixels", async () => {
		const vast = await sharp({ create: { width: 9000, height: 8000, channels: 3, background: "#fff" } })
			.png()
			.toBuffer()
		expect(await reencodePhoto(vast)).toEqual({ ok: false, reason: "photo-too-many-pixels" })
	})
})
