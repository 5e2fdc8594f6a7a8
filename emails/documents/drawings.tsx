import { Line, Path, Svg, View } from "@react-pdf/renderer"
import { gapAfter, stripCells } from "../parts/strip-cells"
import { color } from "../theme"

/** Points to a pixel of the screen, in which the strips are measured. */
const PT = 0.75

/** The fill strip of one line as paths, which print with background graphics switched off. */
export function StripDrawing({ given, asked }: { given: number; asked: number }) {
	const { rows, size } = stripCells(given, asked)
	if (rows.length === 0) return null
	const rowHeight = size.height + 4
	const paths = { given: "", short: "" }
	let width = 0
	rows.forEach((row, rowIndex) => {
		let x = 0
		const y = rowIndex * rowHeight
		row.forEach((cell, index) => {
			if (cell === "given") paths.given += `M${x} ${y}h${size.width}v${size.height}h${-size.width}z`
			else paths.short += `M${x} ${y + size.height - 2}h${size.width}v2h${-size.width}z`
			x += size.width + gapAfter(index, row.length, size)
		})
		width = Math.max(width, x)
	})
	const height = rows.length * rowHeight - 4
	return (
		<Svg viewBox={`0 0 ${width} ${height}`} style={{ width: width * PT, height: height * PT, marginBottom: 1.5 }}>
			{paths.given && <Path d={paths.given} fill={color.stock} />}
			{paths.short && <Path d={paths.short} fill={color.propolis} />}
		</Svg>
	)
}

/** Two ink rules with a hair of paper between them, under a head or a sum. */
export function DoubleRule({ width }: { width?: number }) {
	const rule = { borderTopWidth: 0.75, borderTopColor: color.ink }
	return (
		<View style={{ width, alignSelf: width ? "flex-end" : "stretch" }}>
			<View style={{ ...rule, height: 2.25 }} />
			<View style={rule} />
		</View>
	)
}

/** Two propolis rules at the full height of the note beside them. */
export function NoteRule() {
	const rule = { borderLeftWidth: 0.75, borderLeftColor: color.propolisRule }
	return (
		<View style={{ flexDirection: "row", width: 14 }}>
			<View style={{ ...rule, width: 2.25 }} />
			<View style={rule} />
		</View>
	)
}

/** The dashed rule along which the slip is torn off. */
export function TearLine({ width }: { width: number }) {
	return (
		<Svg viewBox={`0 0 ${width} 1`} style={{ width, height: 1 }}>
			<Line x1={0} y1={0.5} x2={width} y2={0.5} stroke={color.ink} strokeWidth={0.75} strokeDasharray="3 2" />
		</Svg>
	)
}

/** The mark of the service, small, beside its name at the foot. */
export function Mark() {
	return (
		<Svg viewBox="0 0 32 32" style={{ width: 12, height: 12 }}>
			<Path fill={color.ink} d="M14 3a11.5 11.5 0 1 1-2.9 22.6L5.4 31H.6l5.6-8A11.5 11.5 0 0 1 14 3Z" />
			<Path stroke={color.wax} strokeWidth={2} d="M5.4 17.4h14M6.6 21.6h8.4" />
			<Path fill={color.mark} d="M22.6 6.4c4.4.9 7.4 3.6 9 7-2.4 1.6-4.8 2.1-7.6 2Z" />
			<Path fill={color.mark} d="M25.2 9.6C20 6.6 15 7 11.4 10.6c4.2 2.4 8.6 2.9 13.8 2Z" />
			<Path fill={color.wax} d="M17 10.2a1.9 1.9 0 1 0 3.8 0a1.9 1.9 0 1 0 -3.8 0Z" />
		</Svg>
	)
}
