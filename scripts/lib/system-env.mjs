/** What programs that we start may inherit: the system's own variables, and none of the product's that happen to be set. */
const INHERITED = [
	"PATH",
	"HOME",
	"USER",
	"LANG",
	"LC_ALL",
	"TZ",
	"TMPDIR",
	"TERM",
	"COLUMNS",
	"LOG_LEVEL",
	"NO_COLOR",
	"CI",
]

/** The environment to give to a program that is to get nothing of the product's but what is added to it. */
export function systemEnv() {
	return Object.fromEntries(INHERITED.filter((name) => process.env[name]).map((name) => [name, process.env[name]]))
}
