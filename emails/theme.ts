import type { CSSProperties } from "react"

/** The paper and ink of every letter. Mail clients read no style sheets, so the values stand here in full. */
export const color = {
	wax: "#f5f3ec",
	sheet: "#fffefb",
	rule: "#d9d2c3",
	ink: "#2c1812",
	inkSoft: "#58443a",
	inkFaint: "#6f5e52",
	clover: "#1d5a45",
	propolis: "#952e19",
	propolisRule: "#cb9080",
	stock: "#b0660f",
	mark: "#b23a22",
} as const

/** Words are set in Georgia. Its figures hang below the line, so columns of figures and small print are in Arial. */
const words = "Georgia, 'Times New Roman', serif"
const figures = "Arial, Helvetica, sans-serif"

/** Inner space at the left and right of the sheet, in pixels. */
export const gutter = 36

export const type = {
	yard: { fontFamily: words, fontSize: "22px", lineHeight: "27px", fontWeight: 600, color: color.ink },
	title: {
		fontFamily: words,
		fontSize: "30px",
		lineHeight: "36px",
		fontWeight: 400,
		letterSpacing: "-0.3px",
		color: color.ink,
		margin: 0,
	},
	name: { fontFamily: words, fontSize: "17px", lineHeight: "22px", fontWeight: 600, color: color.ink },
	total: { fontFamily: words, fontSize: "20px", lineHeight: "26px", fontWeight: 600, color: color.ink },
	note: { fontFamily: words, fontSize: "16px", lineHeight: "23px", fontStyle: "italic", color: color.inkSoft },
	body: { fontFamily: figures, fontSize: "16px", lineHeight: "24px", color: color.inkSoft },
	small: { fontFamily: figures, fontSize: "14px", lineHeight: "21px", color: color.inkSoft },
	head: { fontFamily: figures, fontSize: "13px", lineHeight: "16px", fontWeight: 400, color: color.inkSoft },
	caption: { fontFamily: figures, fontSize: "13px", lineHeight: "19px", color: color.inkFaint },
	figure: { fontFamily: figures, fontSize: "15px", lineHeight: "20px", color: color.ink, whiteSpace: "nowrap" },
	sum: { fontFamily: figures, fontSize: "20px", lineHeight: "26px", fontWeight: 700, color: color.ink },
	code: {
		fontFamily: figures,
		fontSize: "40px",
		lineHeight: "48px",
		fontWeight: 700,
		letterSpacing: "8px",
		color: color.ink,
	},
	button: { fontFamily: figures, fontSize: "16px", lineHeight: "18px", fontWeight: 600, color: color.sheet },
	link: { fontFamily: figures, fontSize: "15px", lineHeight: "18px", color: color.clover },
} as const satisfies Record<string, CSSProperties>
