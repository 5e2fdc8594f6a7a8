import sharp from "sharp"

const WIDTH = 96
const HEIGHT = 64
const CELL = 8

/** A small picture of capped comb, as a JPEG: rows of wax caps on honey. */
export async function drawPhoto(): Promise<{ content: Buffer; mediaType: string; width: number; height: number }> {
	const pixels = Buffer.alloc(WIDTH * HEIGHT * 3)
	for (let y = 0; y < HEIGHT; y += 1) {
		for (let x = 0; x < WIDTH; x += 1) pixels.set(colourAt(x, y), (y * WIDTH + x) * 3)
	}
	const content = await sharp(pixels, { raw: { width: WIDTH, height: HEIGHT, channels: 3 } })
		.jpeg()
		.toBuffer()
	return { content, mediaType: "image/jpeg", width: WIDTH, height: HEIGHT }
}

function colourAt(x: number, y: number): [red: number, green: number, blue: number] {
	const row = Math.floor(y / CELL)
	const across = ((x + (row % 2) * (CELL / 2)) % CELL) - CELL / 2
	const down = (y % CELL) - CELL / 2
	return Math.hypot(across, down) < CELL / 2 - 0.5 ? [233, 214, 170] : [176, 102, 15]
}
