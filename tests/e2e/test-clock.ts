import { mkdirSync, rmSync, writeFileSync } from "node:fs"
import { dirname } from "node:path"
import { e2eAddresses } from "../setup/e2e-addresses"

function clockFile(): string {
	const file = e2eAddresses().env.TEST_CLOCK_FILE
	if (!file) throw new Error("The product under test runs without a clock that can be moved")
	return file
}

/** Moves the clock of web and worker to `moment`; it runs on from there. */
export function setClock(moment: Date): void {
	mkdirSync(dirname(clockFile()), { recursive: true })
	writeFileSync(clockFile(), String(moment.getTime() - Date.now()))
}

/** Puts the clock of web and worker right again. */
export function resetClock(): void {
	rmSync(clockFile(), { force: true })
}
