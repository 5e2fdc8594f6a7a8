import { join } from "node:path"
import { orRefuse } from "./commands.mjs"
import { root } from "./paths.mjs"
import { demoSecrets } from "./secrets.mjs"
import { systemEnv } from "./system-env.mjs"
import { untilItAnswers } from "./wait.mjs"

const local = (port) => `http://127.0.0.1:${port}`

/** Chooses ports for the parts by `pick`, which answers a free one each time; the web server's may be settled already. */
export async function choosePorts(pick, web) {
	return { web: web ?? (await pick()), mail: await pick(), smtp: await pick(), stripe: await pick() }
}

/** The environment of the product on stand-ins: mail to the catcher, payments to the fake. */
export function productEnv({ databaseUrl, ports, nodeEnv = "production" }) {
	const secrets = demoSecrets()
	return {
		...systemEnv(),
		NODE_ENV: nodeEnv,
		DATABASE_URL: databaseUrl,
		HOST: "127.0.0.1",
		PORT: String(ports.web),
		BASE_URL: local(ports.web),
		SESSION_SECRET: secrets.session,
		SMTP_URL: `smtp://127.0.0.1:${ports.smtp}`,
		MAIL_FROM: "Waxbill <desk@waxbill.example.test>",
		STRIPE_SECRET_KEY: "sk_test_waxbill",
		STRIPE_WEBHOOK_SECRET: secrets.webhook,
		STRIPE_API_BASE: local(ports.stripe),
	}
}

/** Runs one of the built programs (migrate, seed, reset) to its end. */
export function runBuilt(name, sentence, env) {
	return orRefuse(sentence, process.execPath, [join("build/node", `${name}.js`)], { env })
}

/** Starts the mail catcher and the payment fake. With `folder` they keep what they hold there. */
export async function startStandIns(crew, { ports, env, folder }) {
	const mailArgs = ["--ip", "127.0.0.1", "--web-ip", "127.0.0.1", "-s", String(ports.smtp), "-w", String(ports.mail)]
	const keepMail = folder ? ["--mail-directory", join(folder, "mail")] : []
	const maildev = join(root, "node_modules/maildev/dist/bin/maildev.js")
	const mail = crew.start("mail catcher", process.execPath, [maildev, ...mailArgs, "--silent", ...keepMail], {
		env: systemEnv(),
	})
	const stripe = crew.start("payment fake", process.execPath, ["--import", "tsx", "fakes/stripe/server.ts"], {
		env: {
			...systemEnv(),
			PORT: String(ports.stripe),
			WEBHOOK_URL: `${env.BASE_URL}/webhooks/stripe`,
			WEBHOOK_SECRET: env.STRIPE_WEBHOOK_SECRET,
			...(folder && { STATE_FILE: join(folder, "stripe.json") }),
		},
	})
	await untilItAnswers(`${local(ports.mail)}/api/healthz`, mail)
	await untilItAnswers(local(ports.stripe), stripe, { anyAnswer: true })
}

/** Starts the built worker and web server, and waits until the latter is ready. */
export async function startBuilt(crew, { env }) {
	crew.start("worker", process.execPath, ["--enable-source-maps", "build/node/worker.js"], { env })
	const web = crew.start("web server", process.execPath, ["--enable-source-maps", "build/node/server.js"], { env })
	await untilItAnswers(`${env.BASE_URL}/health/ready`, web)
}
