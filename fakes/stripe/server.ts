import { type StripeFakeOptions, startStripeFake } from "./start"

const { PORT, PUBLIC_URL, STATE_FILE, WEBHOOK_SECRET, WEBHOOK_URL } = process.env
const options: StripeFakeOptions = { port: Number(PORT ?? 0) }
if (WEBHOOK_URL && WEBHOOK_SECRET) options.webhook = { url: WEBHOOK_URL, secret: WEBHOOK_SECRET }
if (STATE_FILE) options.stateFile = STATE_FILE
if (PUBLIC_URL) options.publicUrl = PUBLIC_URL

const fake = await startStripeFake(options)
console.log(`listening on ${fake.port}`)

for (const signal of ["SIGINT", "SIGTERM"] as const) {
	process.once(signal, () => void fake.close())
}
