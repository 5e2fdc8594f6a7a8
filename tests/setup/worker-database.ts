/**
 * Gives each test file a fresh copy of the migrated database and a complete environment, before any module of the product
 * is loaded. Nothing listens where mail and payments are pointed: a test that needs them starts its own.
 */
import { afterAll } from "vitest"
import { administer, testDatabaseUrl } from "./test-database"

const url = testDatabaseUrl()
const name = new URL(url).pathname.slice(1)
await administer(url, [
	`drop database if exists ${name} with (force)`,
	`create database ${name} template template_migrated`,
])

Object.assign(process.env, {
	NODE_ENV: "test",
	DATABASE_URL: url,
	BASE_URL: "http://127.0.0.1:3000",
	SESSION_SECRET: "5e".repeat(32),
	SMTP_URL: "smtp://127.0.0.1:9",
	MAIL_FROM: "Waxbill <desk@waxbill.example.test>",
	STRIPE_SECRET_KEY: "sk_test_waxbill",
	STRIPE_WEBHOOK_SECRET: "whsec_waxbill",
	STRIPE_API_BASE: "http://127.0.0.1:9",
	LOG_LEVEL: process.env.LOG_LEVEL ?? "fatal",
})

afterAll(async () => {
	const { closePool } = await import("~/db/client.server")
	await closePool()
})
