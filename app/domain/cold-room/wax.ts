/**
 * Degrees Celsius at which beeswax changes. Melting range and brittleness: secondary sources; softening: from memory,
 * medium confidence.
 */
const WAX_C = { melts: [62, 64], brittleBelow: 18, softFrom: 35 } as const

export type WaxState = "brittle" | "firm" | "soft" | "melting" | "molten"

/** How the wax of a comb behaves at a temperature in degrees Celsius. */
export function waxAt(celsius: number): WaxState {
	if (celsius < WAX_C.brittleBelow) return "brittle"
	if (celsius < WAX_C.softFrom) return "firm"
	if (celsius < WAX_C.melts[0]) return "soft"
	return celsius <= WAX_C.melts[1] ? "melting" : "molten"
}

/**
 * How frozen comb is brought to room temperature, one sentence each. Dry before bagging and moths kept out: COLOSS
 * BEEBOOK, vol. II, wax moths, 5.8.1; sealed while it thaws: from memory, high confidence.
 */
export const THAW_ADVICE: readonly string[] = [
	"Thaw it sealed: leave every piece in its wrap until it is at room temperature, so that the dew forms outside.",
	"Comb that is to be bagged or boxed afterwards must be dry first, or it moulds.",
	"Keep moths out while it thaws: closed cases, or a room they cannot get into.",
	`Wax is brittle below ${WAX_C.brittleBelow} °C (${Math.round(WAX_C.brittleBelow * 1.8 + 32)} °F): set cases down gently until then, and keep them from standing above ${WAX_C.softFrom} °C (${WAX_C.softFrom * 1.8 + 32} °F), where comb sags.`,
]
