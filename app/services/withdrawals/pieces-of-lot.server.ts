import { balanceOf } from "~/domain/trace/balance"
import type { TracedLot } from "~/services/trace/find-forward-trace.server"

/** Pieces of a traced lot that the producer can still put a hand on. */
export const inHandOf = (lot: TracedLot) => balanceOf(lot.piecesHarvested, lot.places).inHand

/** Pieces of a traced lot that are sold. */
export const outOf = (lot: TracedLot) => balanceOf(lot.piecesHarvested, lot.places).out
