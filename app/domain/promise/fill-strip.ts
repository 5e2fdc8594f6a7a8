import { compareDays, type Day } from "~/domain/calendar"
import { canServe, freeToPromise, type Outlook, type SupplyKind } from "./free-to-promise"

/** What a fill strip shows for one day; the three parts sum to what is free to promise. */
export type StripOnDay = {
	day: Day
	/** Free on released stock alone. */
	free: number
	/** What held lots add, and the day by which the last of those that keep until the day is to be released. */
	held: number
	heldUntil: Day | null
	/** What the low figure from the hives adds, and the day on which the last of it is due. */
	expected: number
	expectedOn: Day | null
	/** The next supply after the day, for "8 expected August 24"; null where none is known. */
	next: { on: Day; quantity: number; kind: SupplyKind } | null
}

const SURER_KINDS: Record<SupplyKind, readonly SupplyKind[]> = {
	free: ["free"],
	held: ["free", "held"],
	expected: ["free", "held", "expected"],
}

/**
 * Splits what is free to promise for each of `days` by how sure it is: first what released stock alone allows, then what
 * held lots add to that, then what the hives add. Answers in the order of `days`, in the unit of the outlook.
 * Refuses nothing. This product's own rule.
 */
export function fillStrips(outlook: Outlook & { days: readonly Day[] }): StripOnDay[] {
	const withKinds = (kind: SupplyKind) =>
		freeToPromise({
			...outlook,
			supplies: outlook.supplies.filter((supply) => SURER_KINDS[kind].includes(supply.kind)),
		})
	const onFree = withKinds("free")
	const onHeld = withKinds("held")
	const onAll = withKinds("expected")
	const supplies = outlook.supplies.filter((supply) => supply.quantity > 0).toSorted((a, b) => compareDays(a.on, b.on))

	return outlook.days.map((day, index) => {
		const free = onFree[index]?.free ?? 0
		const held = (onHeld[index]?.free ?? 0) - free
		const expected = (onAll[index]?.free ?? 0) - free - held
		const lastOn = (kind: SupplyKind) =>
			supplies.findLast((supply) => supply.kind === kind && canServe(supply, day))?.on
		const next = supplies.find((supply) => supply.on > day)
		return {
			day,
			free,
			held,
			heldUntil: held > 0 ? (lastOn("held") ?? null) : null,
			expected,
			expectedOn: expected > 0 ? (lastOn("expected") ?? null) : null,
			next: next ? { on: next.on, quantity: next.quantity, kind: next.kind } : null,
		}
	})
}
