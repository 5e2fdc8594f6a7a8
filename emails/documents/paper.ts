import { StyleSheet } from "@react-pdf/renderer"
import { color } from "../theme"
import { sans, serif } from "./fonts"

/** Letter paper with margins of 0.6 in at the head and foot and 0.7 in at the sides; all lengths in points. */
export const margin = { top: 43.2, side: 50.4, bottom: 43.2 }

/** Widths of the columns beside the product, which takes what is left. */
export const column = { number: 30, lots: 31, weight: 68, cases: 104, price: 46, amount: 60 }

/** Ink on white: the fine rule is a little darker than on the screen, so that it survives a cheap printer. */
const fineRule = "#a99d8e"

/**
 * No style that a `fixed` element has or inherits may set `lineHeight`: the renderer multiplies it by the size of the type
 * once more for every page, until the numbers are too great to be written (react-pdf#3452). Elsewhere it
 * stands beside a `fontSize`, by which alone it is measured.
 */
export const paper = StyleSheet.create({
	page: {
		paddingTop: margin.top,
		paddingHorizontal: margin.side,
		paddingBottom: margin.bottom + 24,
		fontFamily: sans,
		fontSize: 11.25,
		color: color.ink,
	},
	text: { fontSize: 11.25, lineHeight: 1.35 },
	beside: { flexDirection: "row", justifyContent: "space-between", alignItems: "flex-end" },
	soft: { color: color.inkSoft },
	yard: { fontFamily: serif, fontWeight: 600, fontSize: 22.5, lineHeight: 1.15, letterSpacing: -0.3 },
	number: { fontFamily: serif, fontSize: 22.5, lineHeight: 1.15, letterSpacing: -0.3, textAlign: "right" },
	group: { fontFamily: serif, fontStyle: "italic", fontSize: 12, color: color.inkSoft, marginBottom: 3 },
	name: { fontFamily: serif, fontWeight: 600, fontSize: 12.75, lineHeight: 1.25 },
	whom: { fontFamily: serif, fontWeight: 600, fontSize: 12.75, lineHeight: 1.25 },
	figure: { fontFamily: serif, fontSize: 11.5, lineHeight: 1.35 },
	amount: { fontFamily: serif, fontSize: 12.75, lineHeight: 1.25, textAlign: "right" },
	small: { fontSize: 9.75, lineHeight: 1.3, color: color.inkFaint },
	heads: {
		flexDirection: "row",
		borderTopWidth: 1.1,
		borderTopColor: color.ink,
		borderBottomWidth: 0.75,
		borderBottomColor: color.ink,
		paddingTop: 6,
		paddingBottom: 5,
		fontSize: 9.75,
		color: color.inkSoft,
	},
	line: {
		flexDirection: "row",
		borderBottomWidth: 0.75,
		borderBottomColor: fineRule,
		paddingTop: 7.5,
		paddingBottom: 6.5,
	},
	orderHead: {
		fontFamily: serif,
		fontStyle: "italic",
		fontSize: 12,
		color: color.inkSoft,
		paddingTop: 10,
		paddingBottom: 3,
	},
	charge: { flexDirection: "row", justifyContent: "space-between", paddingLeft: column.number, paddingVertical: 6.5 },
	total: {
		flexDirection: "row",
		justifyContent: "space-between",
		borderTopWidth: 0.75,
		borderTopColor: color.ink,
		paddingLeft: column.number,
		paddingTop: 7.5,
	},
	totalWords: { fontFamily: serif, fontWeight: 600, fontSize: 16.5, lineHeight: 1.2 },
	note: { fontFamily: serif, fontStyle: "italic", fontSize: 12, lineHeight: 1.32, color: color.inkSoft },
	plain: { fontSize: 11.25, lineHeight: 1.35, color: color.inkSoft },
	slip: { flexDirection: "row", alignItems: "flex-end", paddingTop: 13, gap: 18 },
	foot: {
		position: "absolute",
		left: margin.side,
		right: margin.side,
		bottom: margin.bottom - 6,
		flexDirection: "row",
		justifyContent: "space-between",
		alignItems: "center",
		fontSize: 9.75,
		color: color.inkSoft,
	},
})
