import type { Form } from "~/domain/stall/short-names"

/** The drawing of each form of comb, with the size of its box; it stands in until the producer has pictures. */
export const ART_OF_FORM: Record<Form, { src: string; width: number; height: number }> = {
	round: { src: "/art/section-round.svg", width: 194, height: 172 },
	basswood: { src: "/art/section-basswood.svg", width: 214, height: 194 },
	"clear-box": { src: "/art/section-clear-box.svg", width: 186, height: 178 },
	"cut-comb": { src: "/art/cut-comb.svg", width: 308, height: 128 },
	"half-piece": { src: "/art/cut-comb.svg", width: 308, height: 128 },
	chunk: { src: "/art/chunk-jar.svg", width: 134, height: 192 },
	frame: { src: "/art/section-basswood.svg", width: 214, height: 194 },
}
