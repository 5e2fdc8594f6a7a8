/** A file as it comes in after the fields of its form. Its name is what the sender says: for showing, never a path. */
export type StreamedUpload = {
	fields: Record<string, string>
	fileName: string
	/** The bytes, in pieces as they arrive. Throws `UploadCut` when the form ends too early or exceeds the limit. */
	content: AsyncIterable<Uint8Array>
}

/** The sending was broken off, or more came than is taken. */
export class UploadCut extends Error {
	constructor(readonly reason: "broken-off" | "too-large") {
		super(`an upload was cut: ${reason}`)
		this.name = "UploadCut"
	}
}

const MOST_BYTES_BEFORE_FILE = 64 * 1024
const decoder = new TextDecoder()
const encoder = new TextEncoder()

/**
 * Reads a posted form whose last field is a file, without ever holding the file: the fields before it are read, then its
 * bytes are passed on as they come. The package for forms keeps a file whole in memory, which a long logger file is not
 * worth. Null when the post is no such form. Fields after the file are not read.
 */
export async function streamUpload(request: Request, limits: { mostBytes: number }): Promise<StreamedUpload | null> {
	const [, quoted, plain] =
		/^multipart\/form-data;.*?boundary=(?:"([^"]+)"|([^;\s]+))/i.exec(request.headers.get("content-type") ?? "") ?? []
	const boundary = quoted ?? plain
	if (!boundary || !request.body) return null
	const source = new PieceReader(request.body.getReader(), encoder.encode(`\r\n--${boundary}`))
	// The first boundary has no line before it; given one, it looks like all others.
	source.unread(encoder.encode("\r\n"))
	await source.textUpToBoundary(MOST_BYTES_BEFORE_FILE)
	const fields: Record<string, string> = {}
	for (;;) {
		const head = await source.head()
		if (head === null) return null
		const name = /[;\s]name="([^"]*)"/i.exec(head)?.[1]
		const fileName = /;\s*filename="([^"]*)"/i.exec(head)?.[1]
		if (fileName !== undefined) return { fields, fileName, content: source.upToBoundary(limits.mostBytes) }
		const value = await source.textUpToBoundary(MOST_BYTES_BEFORE_FILE)
		if (name !== undefined) fields[name] = value
	}
}

/** Pieces of a body, read up to the next boundary; holds no more than a piece and a boundary's length. */
class PieceReader {
	#held: Uint8Array = new Uint8Array()

	constructor(
		private readonly source: ReadableStreamDefaultReader<Uint8Array>,
		private readonly boundary: Uint8Array,
	) {}

	unread(bytes: Uint8Array): void {
		this.#held = joined(bytes, this.#held)
	}

	/** The lines above a part's content; null when the form has ended. */
	async head(): Promise<string | null> {
		for (;;) {
			const text = decoder.decode(this.#held)
			if (text.startsWith("--")) return null
			const end = indexOf(this.#held, HEAD_END, 0)
			if (end !== -1) {
				const head = decoder.decode(this.#held.subarray(0, end))
				this.#held = this.#held.subarray(end + HEAD_END.length)
				return head
			}
			if (this.#held.length > MOST_BYTES_BEFORE_FILE || !(await this.#more())) return null
		}
	}

	async textUpToBoundary(mostBytes: number): Promise<string> {
		const parts: string[] = []
		const text = new TextDecoder()
		for await (const piece of this.upToBoundary(mostBytes)) parts.push(text.decode(piece, { stream: true }))
		return parts.join("") + text.decode()
	}

	async *upToBoundary(mostBytes: number): AsyncGenerator<Uint8Array> {
		let sent = 0
		for (;;) {
			const end = indexOf(this.#held, this.boundary, 0)
			// Without a boundary, its beginning may lie at the very end of what is held.
			const upTo = end === -1 ? Math.max(0, this.#held.length - this.boundary.length) : end
			sent += upTo
			if (sent > mostBytes) throw new UploadCut("too-large")
			if (upTo > 0) yield this.#held.subarray(0, upTo)
			this.#held = this.#held.subarray(end === -1 ? upTo : end + this.boundary.length)
			if (end !== -1) return
			if (!(await this.#more())) throw new UploadCut("broken-off")
		}
	}

	async #more(): Promise<boolean> {
		const { done, value } = await this.source.read().catch(() => ({ done: true as const, value: undefined }))
		if (value) this.#held = joined(this.#held, value)
		return !done
	}
}

const HEAD_END = encoder.encode("\r\n\r\n")

function joined(a: Uint8Array, b: Uint8Array): Uint8Array {
	if (a.length === 0) return b
	const both = new Uint8Array(a.length + b.length)
	both.set(a)
	both.set(b, a.length)
	return both
}

function indexOf(bytes: Uint8Array, wanted: Uint8Array, from: number): number {
	return Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength).indexOf(wanted, from)
}
