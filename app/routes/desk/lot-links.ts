import type { LotState } from "~/services/desk/list-lots.server"

/** What can be done with a lot, as the margin of its page offers it. */
export function lotLinks(lot: {
	producer: string
	code: string
	state: LotState
	seesOrders: boolean
}): { to: string; words: string; isFile?: boolean }[] {
	const code = encodeURIComponent(lot.code)
	const desk = `/desk/${lot.producer}`
	const page = `${desk}/lots/${code}`
	const isHeld = lot.state === "held"
	const isWithdrawn = lot.state === "withdrawn"
	return [
		{ to: `${page}/grade`, words: "Grade it" },
		{ to: `${page}/scale`, words: "Net contents" },
		{ to: `${desk}/cold-room`, words: "Cold room" },
		...(isHeld ? [{ to: `${page}/release`, words: "Release" }] : []),
		...(isWithdrawn
			? []
			: [
					{ to: `${page}/regroup`, words: "Split or put together" },
					{ to: `${page}/move`, words: "Move pieces" },
				]),
		{ to: `${page}/trace`, words: "Who had it, where it is from" },
		{ to: `/shop/${lot.producer}/lots/${code}`, words: "Its public page" },
		{ to: `${page}/label`, words: "Label with its code" },
		...(lot.seesOrders && !isWithdrawn ? [{ to: `${desk}/withdrawals/new?lot=${code}`, words: "Withdraw it" }] : []),
	]
}
