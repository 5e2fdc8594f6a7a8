import { expect, test } from "vitest"
import { addDays } from "~/domain/calendar"
import { assignLots } from "~/domain/promise/assign-lots"
import { explainFree } from "~/domain/promise/explain-free"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { repeatable, solveFlow } from "./solver"

const dayOf = (number: number) => addDays("2026-08-10", number)

/** A crop of up to 8 lots and 10 orders in 20 days; lots keep from one day to all of them. */
function randomCrop(random: (below: number) => number) {
	const lots = Array.from({ length: random(9) }, (_, index) => {
		const first = random(20)
		return {
			lotId: `L${index}`,
			availableFrom: dayOf(first),
			bestBefore: dayOf(first + random(20 - first)),
			pieces: random(30),
		}
	})
	const orders = Array.from({ length: random(11) }, (_, index) => ({
		orderId: `O${index}`,
		on: dayOf(random(20)),
		pieces: random(14),
	}))
	return { lots, orders, reserve: random(3) * random(4), day: dayOf(random(20)) }
}

const outlookOf = ({ lots, orders, reserve }: ReturnType<typeof randomCrop>) => ({
	supplies: lots.map((lot) => ({
		on: lot.availableFrom,
		until: lot.bestBefore,
		quantity: lot.pieces,
		kind: "free" as const,
	})),
	promises: orders.map((order) => ({ on: order.on, quantity: order.pieces })),
	reserve,
})

test("on 2,000 random crops the lots serve as many pieces as a maximum flow does", () => {
	const random = repeatable(20260810)
	let whole = 0
	for (let run = 0; run < 2000; run += 1) {
		const crop = randomCrop(random)
		const assigned = assignLots(crop)
		const served = assigned.picks.reduce((sum, pick) => sum + pick.pieces, 0)
		expect(served).toBe(solveFlow(crop)?.served)
		if (assigned.ok) whole += 1
	}
	// Both kinds must be among them, or the comparison says little.
	expect(whole).toBeGreaterThan(200)
	expect(whole).toBeLessThan(1800)
})

test("on 2,000 random crops what is free is the most that can be promised with every promise kept", () => {
	const random = repeatable(20260818)
	let kept = 0
	for (let run = 0; run < 2000; run += 1) {
		const crop = randomCrop(random)
		const [answer] = freeToPromise({ ...outlookOf(crop), days: [crop.day] })
		const solved = solveFlow({ ...crop, unlimited: crop.day, inFull: true })
		if (solved) {
			kept += 1
			expect(answer?.raw).toBe(solved.extra - crop.reserve)
			continue
		}
		// Some promise cannot be kept: all that can go out, less all that is owed.
		const owed = crop.orders.reduce((sum, order) => sum + order.pieces, 0)
		const mostOut = solveFlow({ ...crop, unlimited: crop.day })
		expect(answer?.raw).toBe((mostOut?.served ?? 0) - owed - crop.reserve)
	}
	expect(kept).toBeGreaterThan(200)
	expect(kept).toBeLessThan(1800)
})

test("the explanation of a figure comes to the figure", () => {
	const random = repeatable(20260825)
	for (let run = 0; run < 3000; run += 1) {
		const crop = randomCrop(random)
		const outlook = outlookOf(crop)
		const [answer] = freeToPromise({ ...outlook, days: [crop.day] })
		const told = explainFree({ ...outlook, day: crop.day })
		expect(told.raw).toBe(answer?.raw)
		expect(told.supplied - told.promised - told.reserve).toBe(told.raw)
		expect(told.tightestOn >= crop.day).toBe(true)
	}
})
