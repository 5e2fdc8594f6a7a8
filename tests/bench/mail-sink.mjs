import { createServer } from "node:net"

/**
 * A mail server that takes every letter and keeps none: it counts letters and the PDFs in them. Listens on `port` of this
 * machine; a catcher that reads and keeps each letter would take a good part of the processor that is measured.
 */
export function startMailSink(port) {
	const counts = { letters: 0, pdfs: 0 }
	const server = createServer((socket) => {
		let isLetter = false
		let text = ""
		socket.setEncoding("latin1")
		socket.on("error", () => {})
		const say = (line) => socket.write(`${line}\r\n`)
		const take = () => {
			for (;;) {
				const end = text.indexOf(isLetter ? "\r\n.\r\n" : "\r\n")
				if (end < 0) return
				const part = text.slice(0, end)
				text = text.slice(end + (isLetter ? 5 : 2))
				if (isLetter) {
					counts.letters += 1
					counts.pdfs += part.split("Content-Type: application/pdf").length - 1
					isLetter = false
					say("250 taken")
				} else {
					const verb = part.slice(0, 4).toUpperCase()
					isLetter = verb === "DATA"
					if (verb === "QUIT") return socket.end("221 bye\r\n")
					say(isLetter ? "354 go on" : "250 yes")
				}
			}
		}
		socket.on("data", (data) => {
			text += data
			take()
		})
		say("220 sink")
	})
	return new Promise((resolve, reject) => {
		server.once("error", reject)
		server.listen(port, "127.0.0.1", () => resolve({ counts, close: () => server.close() }))
	})
}
