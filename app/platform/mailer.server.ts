import nodemailer, { type Transporter } from "nodemailer"
import { env } from "./env.server"

const CONNECT_MS = 5_000
const SILENCE_MS = 15_000
const LOOPBACK_HOSTS = ["127.0.0.1", "localhost", "[::1]"]

/** A letter to one address. `messageId` is the same when it is sent again, so that mail programs show it once. */
export interface OutgoingMail {
	to: string
	subject: string
	html: string
	text: string
	messageId: string
	replyTo?: string | undefined
	attachments?: readonly { filename: string; content: Buffer; contentType: string }[]
}

/**
 * What SMTP_URL leaves open about encryption: on this machine none is needed, to another one it must be had, or codes
 * and invoices travel in the open. `?requireTLS=…` or `?ignoreTLS=…` in the address decides otherwise.
 */
function encryption(smtpUrl: string): { requireTLS?: boolean; ignoreTLS?: boolean } {
	const { protocol, hostname, searchParams } = new URL(smtpUrl)
	if (protocol === "smtps:" || searchParams.has("requireTLS") || searchParams.has("ignoreTLS")) return {}
	return LOOPBACK_HOSTS.includes(hostname) ? { ignoreTLS: true } : { requireTLS: true }
}

/** A pool of connections to the mail server at `smtpUrl`; nothing is opened before the first letter. */
function openPool(smtpUrl: string): Transporter {
	return nodemailer.createTransport({
		url: smtpUrl,
		pool: true,
		maxConnections: 3,
		connectionTimeout: CONNECT_MS,
		greetingTimeout: CONNECT_MS,
		socketTimeout: SILENCE_MS,
		disableFileAccess: true,
		disableUrlAccess: true,
		...encryption(smtpUrl),
	})
}

let pool: Transporter | undefined

/**
 * Hands one letter to the mail server of the environment. Resolves once the server has taken it; throws when it cannot be
 * reached within seconds or refuses the letter, and whoever calls decides about trying again.
 */
export async function sendMail(mail: OutgoingMail): Promise<void> {
	pool ??= openPool(env.SMTP_URL)
	const { to, subject, html, text, messageId, replyTo, attachments = [] } = mail
	await pool.sendMail({
		from: env.MAIL_FROM,
		// An object, not text: a list of addresses written into one field cannot become several recipients.
		to: { name: "", address: to },
		subject,
		html,
		text,
		messageId,
		attachments: [...attachments],
		// Keeps out-of-office answers from coming back.
		headers: { "Auto-Submitted": "auto-generated" },
		...(replyTo && { replyTo }),
	})
}

/** Closes the connections of this process, which otherwise keep it alive for minutes; for a clean stop. */
export function closeMailer(): void {
	pool?.close()
	pool = undefined
}
