import { type AddressInfo, createServer, type Server, type Socket } from "node:net"
import nodemailer from "nodemailer"
import { afterEach, describe, expect, it, vi } from "vitest"

/** A mail server that takes every letter and keeps its text; `refuse` makes it turn recipients away. */
function mailServer({ refuse = false } = {}) {
	const letters: string[] = []
	const recipients: string[] = []
	const sockets = new Set<Socket>()
	const server = createServer((socket) => {
		sockets.add(socket)
		let inData = false
		let data = ""
		socket.write("220 ready\r\n")
		socket.on("data", (chunk) => {
			data += chunk.toString("latin1")
			for (;;) {
				const end = data.indexOf(inData ? "\r\n.\r\n" : "\r\n")
				if (end < 0) return
				const part = data.slice(0, end)
				data = data.slice(end + (inData ? 5 : 2))
				if (inData) {
					letters.push(part)
					inData = false
					socket.write("250 taken\r\n")
				} else if (part.startsWith("RCPT")) {
					recipients.push(part)
					socket.write(refuse ? "550 nobody of that name\r\n" : "250 ok\r\n")
				} else if (part === "STARTTLS") socket.write("502 not here\r\n")
				else if (part === "DATA") {
					inData = true
					socket.write("354 go on\r\n")
				} else socket.write("250 ok\r\n")
			}
		})
	})
	const close = () => {
		for (const socket of sockets) socket.destroy()
		server.close()
	}
	return { server, letters, recipients, close }
}

const listen = (server: Server) =>
	new Promise<string>((resolve) => {
		server.listen(0, "127.0.0.1", () => resolve(`smtp://127.0.0.1:${(server.address() as AddressInfo).port}`))
	})

const mail = {
	to: "rosa@pantryandplume.example.test",
	subject: "Invoice 1203 for Crème & Comb",
	html: "<p>Please pay</p>",
	text: "Please pay",
	messageId: "<6f1a@waxbill>",
}

let mailer: typeof import("~/platform/mailer.server")
let closeServer = () => {}

async function start(options: { refuse?: boolean } = {}) {
	const { server, letters, recipients, close } = mailServer(options)
	closeServer = close
	const address = await listen(server)
	await loadMailer(address)
	return { letters, recipients, address }
}

async function loadMailer(smtpUrl: string) {
	vi.doMock("~/platform/env.server", () => ({
		env: { SMTP_URL: smtpUrl, MAIL_FROM: "Waxbill <desk@waxbill.example.test>" },
	}))
	vi.resetModules()
	mailer = await import("~/platform/mailer.server")
}

afterEach(() => {
	mailer.closeMailer()
	closeServer()
	vi.doUnmock("~/platform/env.server")
	vi.restoreAllMocks()
})

describe("the mailer", () => {
	it("hands over one letter with its number, where answers go, and its file", async () => {
		const { letters } = await start()
		const content = Buffer.from("%PDF-made-up")
		await mailer.sendMail({
			...mail,
			replyTo: "orders@larkmoor.example.test",
			attachments: [{ filename: "invoice-1203.pdf", content, contentType: "application/pdf" }],
		})

		expect(letters).toHaveLength(1)
		const letter = letters[0] ?? ""
		expect(letter).toContain("From: Waxbill <desk@waxbill.example.test>")
		expect(letter).toContain("To: rosa@pantryandplume.example.test")
		expect(letter).toContain("Reply-To: orders@larkmoor.example.test")
		expect(letter).toContain("Message-ID: <6f1a@waxbill>")
		expect(letter).toContain("Auto-Submitted: auto-generated")
		expect(letter).toContain("Content-Type: text/plain")
		expect(letter).toContain("Content-Type: text/html")
		expect(letter).toMatch(/Content-Type: application\/pdf; name=invoice-1203\.pdf/)
		expect(letter).toContain(content.toString("base64"))
	})

	it("sends several letters, one after another and at once", async () => {
		const { letters } = await start()
		await mailer.sendMail(mail)
		await Promise.all(
			Array.from({ length: 8 }, (_, index) => mailer.sendMail({ ...mail, messageId: `<${index}@waxbill>` })),
		)

		expect(new Set(letters.map((letter) => /Message-ID: (\S+)/.exec(letter)?.[1])).size).toBe(9)
	})

	it("does not make two recipients out of one field", async () => {
		const { letters, recipients } = await start()
		const to = "rosa@pantryandplume.example.test, all@list.example.test"
		await mailer.sendMail({ ...mail, to })

		expect(letters).toHaveLength(1)
		expect(recipients).toEqual([`RCPT TO:<"rosa@pantryandplume.example.test, all"@list.example.test>`])
	})

	it("throws what the server says when it turns the recipient away", async () => {
		const { letters } = await start({ refuse: true })

		await expect(mailer.sendMail(mail)).rejects.toThrow(/nobody of that name/)
		expect(letters).toEqual([])
	})

	it("throws at once when no server is there, and sends again when it is back", async () => {
		const { address } = await start()
		closeServer()
		await expect(mailer.sendMail(mail)).rejects.toThrow(/ECONNREFUSED/)

		const { server, letters, close } = mailServer()
		closeServer = close
		await new Promise<void>((resolve) => server.listen(Number(new URL(address).port), "127.0.0.1", () => resolve()))
		await mailer.sendMail(mail)
		expect(letters).toHaveLength(1)
	})

	it("gives up on a server that offers no encryption where encryption is asked for", async () => {
		const { letters, address } = await start()
		await loadMailer(`${address}?requireTLS=true`)

		await expect(mailer.sendMail(mail)).rejects.toThrow(/STARTTLS/)
		expect(letters).toEqual([])
	})

	it.each([
		["smtp://mail.example.test:587", { requireTLS: true }],
		["smtp://127.0.0.1:1025", { ignoreTLS: true }],
		["smtp://localhost:1025", { ignoreTLS: true }],
	])("asks for encryption unless the server is on this machine: %s", async (address, expected) => {
		const transport = { sendMail: async () => ({}), close: () => {} }
		const create = vi.spyOn(nodemailer, "createTransport").mockReturnValue(transport as never)
		await loadMailer(address)
		await mailer.sendMail(mail)

		expect(create.mock.calls[0]?.[0]).toMatchObject(expected)
	})
})
