/** Where the parts of the running product are, for browser tests. Addresses have no slash at the end. */
export type E2eAddresses = {
	web: string
	/** The mail catcher's page and its API. */
	mail: string
	/** The payment fake, its hosted pages and its switches. */
	stripe: string
	/** The product's database, as the login that owns the schema. */
	databaseUrl: string
	/** The environment that the web server and the worker run with. */
	env: Record<string, string>
}

const VARIABLE = "WAXBILL_E2E"

/** Hands the addresses on to the processes that run the tests, which inherit the environment. */
export function provideAddresses(addresses: string): void {
	process.env[VARIABLE] = addresses
}

/** The addresses of the product under test. Throws outside a run of the browser tests. */
export function e2eAddresses(): E2eAddresses {
	const text = process.env[VARIABLE]
	if (!text) throw new Error("The product under test is started by the browser tests' own setup, which has not run")
	return JSON.parse(text) as E2eAddresses
}
