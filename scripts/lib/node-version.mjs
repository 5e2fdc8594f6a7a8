/**
 * Ends the script with one sentence when Node.js is too old. Import it before anything else. It is written so that old
 * versions can read it.
 */
const LEAST = [20, 19]

const parts = process.versions.node.split(".").map(Number)
if (parts[0] < LEAST[0] || (parts[0] === LEAST[0] && parts[1] < LEAST[1])) {
	console.error(
		"Waxbill needs Node.js " +
			LEAST.join(".") +
			" or newer, and this is " +
			process.versions.node +
			": install a newer one.",
	)
	process.exit(1)
}
