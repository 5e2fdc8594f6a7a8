import type { Form } from "~/domain/stall/short-names"
import type { PieceName } from "~/ui/icons"

/** Which drawing stands for a form of comb. */
export const PIECE_OF_FORM: Record<Form, PieceName> = {
	round: "round",
	basswood: "basswood",
	"clear-box": "clear-box",
	"cut-comb": "cut-comb",
	"half-piece": "half-piece",
	chunk: "chunk-jar",
	frame: "basswood",
}
