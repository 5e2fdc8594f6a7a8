import { Rect, Svg, Text, View } from "@react-pdf/renderer"
import { fullDay } from "~/domain/calendar"
import { boxesOf, lotWords, type PackingSlip, slipParties } from "~/domain/orders/packing-slip"
import { casesWords } from "~/domain/quantity"
import { color } from "../theme"
import { column, paper } from "./paper"
import { Notes, Paper, Parties, renderPaper } from "./paper-parts"

const width = { lots: 104, weight: 70, cases: 116 }
const BOX = { size: 10, gap: 4, inRow: 8 }

/**
 * Draws the packing slip of an order on Letter paper: what is in which case from which lot, an empty box to tick for each
 * case, the heads of the columns on every page, and a line to sign for it. No prices: those are on the invoice.
 */
export function renderPackingSlipPdf(slip: PackingSlip): Promise<Buffer> {
	return renderPaper(slip, (legible) => <SlipDocument slip={legible} />)
}

function SlipDocument({ slip }: { slip: PackingSlip }) {
	return (
		<Paper
			title={`Packing slip ${slip.orderNumber}`}
			yard={slip.yard}
			subject={`Order ${slip.orderNumber} of ${slip.store.name} for ${fullDay(slip.deliveryOn)}`}
			day={slip.deliveryOn}
			fine="One box is one case."
		>
			<Parties parties={slipParties(slip)} />
			<View>
				<View style={paper.heads} fixed>
					<Text style={{ width: column.number }}>No.</Text>
					<Text style={{ flex: 1 }}>Product</Text>
					<Text style={{ width: width.lots }}>Lot</Text>
					<Text style={{ width: width.weight }}>Net weight</Text>
					<Text style={{ width: width.cases }}>Cases</Text>
				</View>
				{slip.lines.map((line) => (
					<LineRow key={line.code} line={line} />
				))}
			</View>
			<Notes reasons={slip.note ? [slip.note] : []} plain={[slip.care]} />
			<View wrap={false} style={{ flexDirection: "row", gap: 24, marginTop: "auto", paddingTop: 40 }}>
				<SignHere words="Taken in by" grow={2} />
				<SignHere words="Day and time" />
				<SignHere words="Broken pieces" />
			</View>
		</Paper>
	)
}

function LineRow({ line }: { line: PackingSlip["lines"][number] }) {
	return (
		<View style={paper.line} wrap={false}>
			<Text style={[paper.figure, paper.soft, { width: column.number }]}>{line.code}</Text>
			<View style={{ flex: 1, paddingRight: 8 }}>
				<Text style={paper.name}>{line.name}</Text>
				{line.detail && <Text style={paper.small}>{line.detail}</Text>}
			</View>
			<View style={{ width: width.lots, paddingRight: 6 }}>
				{line.lots.map((lot) => (
					<Text key={lot.code} style={paper.small}>
						{lotWords(lot)}
					</Text>
				))}
			</View>
			<Text style={[paper.figure, { width: width.weight, paddingRight: 4 }]}>{line.netWeight}</Text>
			<View style={{ width: width.cases }}>
				<Boxes count={boxesOf(line.cases)} />
				<Text style={paper.small}>{casesWords(line.cases)}</Text>
			</View>
		</View>
	)
}

function Boxes({ count }: { count: number }) {
	if (count === 0) return null
	const step = BOX.size + BOX.gap
	const rows = Math.ceil(count / BOX.inRow)
	const [wide, high] = [Math.min(count, BOX.inRow) * step, rows * step]
	return (
		<Svg viewBox={`0 0 ${wide} ${high}`} style={{ width: wide, height: high }}>
			{Array.from({ length: count }, (_, index) => (
				<Rect
					// biome-ignore lint/suspicious/noArrayIndexKey: boxes are all alike
					key={index}
					x={(index % BOX.inRow) * step + 0.5}
					y={Math.floor(index / BOX.inRow) * step + 0.5}
					width={BOX.size}
					height={BOX.size}
					fill="none"
					stroke={color.ink}
					strokeWidth={0.75}
				/>
			))}
		</Svg>
	)
}

function SignHere({ words, grow = 1 }: { words: string; grow?: number }) {
	return (
		<View style={{ flexGrow: grow, flexBasis: 0, borderTopWidth: 0.75, borderTopColor: color.ink, paddingTop: 4 }}>
			<Text style={paper.small}>{words}</Text>
		</View>
	)
}
