const ICONS = {
	delivery: "M2.5 3.5h11v9h-11zM2.5 6h11M6 9h4",
	market: "M2 7 3.5 2.5h9L14 7M2 7c0 2 3 2 3 0 0 2 3 2 3 0 0 2 3 2 3 0 0 2 3 2 3 0M3 9v5M13 9v5",
	printer: "M4.5 6V2h7v4M4.5 11h-3V6h13v5h-3M4.5 9h7v5h-7z",
	tick: "m2.5 8.5 3.5 3.5 7.5-8",
	cross: "m4 4 8 8M12 4l-8 8",
	left: "M10 3 5 8l5 5",
	right: "m6 3 5 5-5 5",
	minus: "M3 8h10",
	plus: "M3 8h10M8 3v10",
	"no-signal": "M2 13V11M6 13V8.5M10 13V6M14 13V3M1.5 2l13 12.5",
	signal: "M2 13V11M6 13V8.5M10 13V6M14 13V3",
	card: "M1.5 3.5h13v9h-13zM1.5 6.5h13M4 10h3",
	cash: "M1.5 4h13v8h-13zM10 8a2 2 0 1 1-4 0 2 2 0 0 1 4 0z",
} as const

export type IconName = keyof typeof ICONS

/** A drawn sign in a 16 px box. It decorates words that stand beside it, so it is never read out. */
export function Icon({ name, size = 16 }: { name: IconName; size?: number }) {
	return (
		<svg className="icon" width={size} height={size} viewBox="0 0 16 16" aria-hidden="true">
			<path d={ICONS[name]} />
		</svg>
	)
}

const PIECES = {
	round: "M34.5 19a15.5 15.5 0 1 1-31 0 15.5 15.5 0 0 1 31 0zM29.5 19a10.5 10.5 0 1 1-21 0 10.5 10.5 0 0 1 21 0z",
	basswood: "M4 6h26v26H4zM9 11h16v16H9zM4 6l4-3h26v26l-4 3M30 6l4-3",
	"clear-box":
		"M10 4h18a6 6 0 0 1 6 6v18a6 6 0 0 1-6 6H10a6 6 0 0 1-6-6V10a6 6 0 0 1 6-6zM13 10h12a3 3 0 0 1 3 3v12a3 3 0 0 1-3 3H13a3 3 0 0 1-3-3V13a3 3 0 0 1 3-3zM15 34v2h8v-2",
	"cut-comb": "M3 18h23v13H3zM3 18l8-9h24l-9 9M35 9v12l-9 10M3 24.5h23",
	"half-piece": "M3 19h13v13H3zM3 19l8-9h14l-9 9M25 10v12l-9 10M3 25.5h13",
	"chunk-jar": "M10 4h18v7H10zM10 11c-3 2-4 4-4 7v14c0 2 1 3 3 3h20c2 0 3-1 3-3V18c0-3-1-5-4-7M14 18h10v12H14z",
} as const

export type PieceName = keyof typeof PIECES

/** The outline of one piece, for the stall: a shape that a hand finds before the eye has read the name. */
export function PieceGlyph({ piece, size = 38 }: { piece: PieceName; size?: number }) {
	return (
		<svg className="piece" width={size} height={size} viewBox="0 0 38 38" aria-hidden="true">
			<path d={PIECES[piece]} />
		</svg>
	)
}

/** The waxbill. Below 28 px the plainer drawing is used. */
export function Mark({ size = 30 }: { size?: number }) {
	if (size < 28) {
		return (
			<svg width={size} height={size} viewBox="0 0 32 32" fill="none" aria-hidden="true">
				<path fill="#2c1812" d="M14 3a11.5 11.5 0 1 1-2.9 22.6L5.4 31H.6l5.6-8A11.5 11.5 0 0 1 14 3Z" />
				<path stroke="#f5f3ec" strokeWidth="2" d="M5.4 17.4h14M6.6 21.6h8.4" />
				<path fill="#b23a22" d="M22.6 6.4c4.4.9 7.4 3.6 9 7-2.4 1.6-4.8 2.1-7.6 2Z" />
				<path fill="#b23a22" d="M25.2 9.6C20 6.6 15 7 11.4 10.6c4.2 2.4 8.6 2.9 13.8 2Z" />
				<circle cx="18.9" cy="10.2" r="1.9" fill="#f5f3ec" />
			</svg>
		)
	}
	return (
		<svg width={(size * 50) / 48} height={size} viewBox="0 0 50 48" fill="none" aria-hidden="true">
			<path fill="#2c1812" d="M24 6.5a15.5 15.5 0 1 1-3.6 30.6L9.8 45.5H2.6l10-12.9A15.5 15.5 0 0 1 24 6.5Z" />
			<path stroke="#f5f3ec" strokeWidth="1.6" d="M12 25.8h20.4M12.6 29.9h19.8M14.6 34h9.8" />
			<path fill="#b23a22" d="M37.9 13.7c3.9.8 7.3 3.3 9.6 6.7-2.5 1.6-5.2 2.3-8.1 2.3Z" />
			<path fill="#b23a22" d="M39.1 15.6c-5.7-2.7-11.7-2.5-17 1.5 5.5 2.7 11.6 3.2 17.3 2.3Z" />
			<circle cx="32.1" cy="16.6" r="1.75" fill="#f5f3ec" />
		</svg>
	)
}
