import type { TestProject } from "vitest/node"
import { migrateDatabase } from "~/db/migrate.server"
import { administer, withDatabase } from "./test-database"

const TEMPLATE = "template_migrated"

/** Makes the database that each test file's own is a copy of, and migrates it once. */
export default async function setup(project: TestProject): Promise<void> {
	const server = process.env.TEST_DATABASE_URL
	if (!server)
		throw new Error("These tests need their own PostgreSQL: run them by node scripts/test.mjs services [file]")
	await administer(server, [`drop database if exists ${TEMPLATE} with (force)`, `create database ${TEMPLATE}`])
	const templateUrl = withDatabase(server, TEMPLATE)
	await migrateDatabase(templateUrl)
	project.provide("templateUrl", templateUrl)
}
