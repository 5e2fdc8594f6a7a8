import loadHighs from "highs"
import type { AssignableLot, AssignableOrder } from "~/domain/promise/assign-lots"

const highs = await loadHighs()

/**
 * The most pieces that can be served, as a maximum flow written as a linear programme and solved by HiGHS, a general
 * solver that knows nothing of lots. `unlimited` adds an order of any size on that day; with `inFull` every other order
 * must be served whole, and null says that no assignment does so. `extra` is what the order of any size gets.
 */
export function solveFlow(facts: {
	lots: readonly AssignableLot[]
	orders: readonly AssignableOrder[]
	unlimited?: string
	inFull?: boolean
}): { served: number; extra: number } | null {
	const most = facts.lots.reduce((sum, lot) => sum + lot.pieces, 0)
	const orders = facts.orders.map((order) => ({ ...order, isExtra: false }))
	if (facts.unlimited) orders.push({ orderId: "extra", on: facts.unlimited, pieces: most, isExtra: true })
	const arcs = facts.lots.flatMap((lot, from) =>
		orders.flatMap((order, to) =>
			lot.availableFrom <= order.on && order.on <= lot.bestBefore ? [{ from, to, name: `f${from}_${to}` }] : [],
		),
	)
	const into = (index: number) => arcs.filter(({ to }) => to === index).map(({ name }) => name)
	const outOf = (index: number) => arcs.filter(({ from }) => from === index).map(({ name }) => name)
	if (facts.inFull && orders.some((order, to) => !order.isExtra && order.pieces > 0 && into(to).length === 0))
		return null
	if (arcs.length === 0) return { served: 0, extra: 0 }
	const row = (names: string[], name: string, bound: string) =>
		names.length > 0 ? ` ${name}: ${names.join(" + ")} ${bound}` : []
	const objective = facts.inFull ? into(orders.length - 1) : arcs.map(({ name }) => name)
	const programme = [
		"Maximize",
		` obj: ${objective.length > 0 ? objective.join(" + ") : `0 ${arcs[0]?.name}`}`,
		"Subject To",
		...facts.lots.flatMap((lot, index) => row(outOf(index), `l${index}`, `<= ${lot.pieces}`)),
		...orders.flatMap((order, index) =>
			row(into(index), `o${index}`, `${facts.inFull && !order.isExtra ? "=" : "<="} ${order.pieces}`),
		),
		"End",
	].join("\n")
	const solved = highs.solve(programme, { output_flag: false })
	if (solved.Status === "Infeasible") return null
	if (solved.Status !== "Optimal") throw new Error(`the solver says ${solved.Status}`)
	const flow = (names: string[]) =>
		Math.round(names.reduce((sum, name) => sum + Number(solved.Columns[name]?.Primal ?? 0), 0))
	return {
		served: flow(arcs.map(({ name }) => name)),
		extra: facts.unlimited ? flow(into(orders.length - 1)) : 0,
	}
}

/** Random whole numbers from 0 to `below` - 1 that are the same in every run (a linear congruence, Numerical Recipes). */
export function repeatable(seed: number): (below: number) => number {
	let state = seed >>> 0
	return (below) => {
		state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0
		return Math.floor((state / 2 ** 32) * below)
	}
}
