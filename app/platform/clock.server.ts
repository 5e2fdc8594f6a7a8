import { readFileSync } from "node:fs"
import { env } from "./env.server"

/**
 * The one place that asks what time it is; rules below are given the answer. Where TEST_CLOCK_FILE is set, the file holds by
 * how many milliseconds this clock is ahead, for all processes that read it; no file is no difference.
 */
export function now(): Date {
	const file = env.TEST_CLOCK_FILE
	return new Date(Date.now() + (file === undefined ? 0 : readAhead(file)))
}

function readAhead(file: string): number {
	let text: string
	try {
		text = readFileSync(file, "utf8").trim()
	} catch (error) {
		if ((error as NodeJS.ErrnoException).code === "ENOENT") return 0
		throw error
	}
	if (!/^-?\d{1,12}$/.test(text)) throw new RangeError(`TEST_CLOCK_FILE holds no milliseconds: ${text.slice(0, 40)}`)
	return Number(text)
}
