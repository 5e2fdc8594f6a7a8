import { type ForwardTrace, findForwardTrace, type TracedMarketDay } from "~/services/trace/find-forward-trace.server"
import { inHandOf, outOf } from "./pieces-of-lot.server"

/** What a withdrawal of a lot would reach, before it is begun. In pieces. */
export type WithdrawalPlan = {
	/** The lot itself, first, and those that came from it and are not withdrawn yet. */
	lots: { code: string; productName: string; detail: string; inHand: number; out: number; isAsked: boolean }[]
	isWithdrawn: boolean
	storeCount: number
	storePieces: number
	packedOrders: { number: number; storeName: string; lot: string; pieces: number }[]
	marketDays: TracedMarketDay[]
}

/** What is known before one lot is withdrawn, with the lots made from it; null when the producer has none of that code. */
export async function findWithdrawalPlan(query: { producerId: string; code: string }): Promise<WithdrawalPlan | null> {
	const trace = await findForwardTrace(query)
	if (!trace) return null
	const sent = trace.orders.filter(hasLeft)
	return {
		lots: trace.lots
			.filter((lot) => lot.code === query.code || lot.state !== "withdrawn")
			.map((lot) => ({
				code: lot.code,
				productName: lot.productName,
				detail: lot.detail,
				inHand: inHandOf(lot),
				out: outOf(lot),
				isAsked: lot.code === query.code,
			})),
		isWithdrawn: trace.lots.some((lot) => lot.code === query.code && lot.state === "withdrawn"),
		storeCount: new Set(sent.map(({ storeId }) => storeId)).size,
		storePieces: sent.reduce((sum, { pieces }) => sum + pieces, 0),
		packedOrders: trace.orders.filter(({ state }) => state === "packed"),
		marketDays: trace.marketDays,
	}
}

const hasLeft = ({ state }: ForwardTrace["orders"][number]) => state === "sent" || state === "received"
