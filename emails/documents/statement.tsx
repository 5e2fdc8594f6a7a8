import { Document, Page, renderToBuffer, Text, View } from "@react-pdf/renderer"
import { fullDay } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { joinKnown } from "../words"
import { DoubleRule, Mark } from "./drawings"
import { registerFonts } from "./fonts"
import { legible } from "./legible"
import { paper } from "./paper"
import type { StatementProps } from "./statement-props"

const width = { day: 112, amount: 78, balance: 84 }

/** Draws a statement on Letter paper, the heads of the columns on every page, what is owed and its ageing on the last. */
export async function renderStatementPdf(statement: StatementProps): Promise<Buffer> {
	const writable = registerFonts()
	return renderToBuffer(<StatementDocument statement={legible(statement, writable)} />)
}

/**
 * Each page is laid out by itself: given all lines at once the renderer takes a time that grows with their square, and a
 * statement may have ten thousand.
 */
function StatementDocument({ statement }: { statement: StatementProps }) {
	const { yard, store, range, lines } = statement
	const pages = pagesOf(lines)
	return (
		<Document
			title={`Statement of ${store.name}`}
			author={yard.name}
			subject={`Statement of ${store.name}, ${fullDay(range.from)} to ${fullDay(range.until)}`}
			creator="Waxbill"
			producer="Waxbill"
			language="en-US"
			creationDate={new Date(`${range.until}T12:00:00Z`)}
		>
			{pages.map((page, index) => (
				// biome-ignore lint/suspicious/noArrayIndexKey: the pages of a statement are never reordered
				<Page key={index} size="LETTER" style={paper.page}>
					{index === 0 && <Head statement={statement} />}
					<Heads />
					{index === 0 && <BroughtForward statement={statement} />}
					{page.map((line, row) => (
						// biome-ignore lint/suspicious/noArrayIndexKey: the lines of a statement are never reordered
						<LineRow key={row} line={line} />
					))}
					{index === pages.length - 1 && <Closing statement={statement} />}
					<Foot page={index + 1} pages={pages.length} />
				</Page>
			))}
		</Document>
	)
}

type Line = StatementProps["lines"][number]

/** Room for lines on a page, in points, and what the head of the first and the end of the last take of it. */
const ROOM = { page: 610, head: 190, closing: 150 }
const NOTE_SIGNS = 52

/** How high a line will be: a little more than it is, so that a page never runs over. */
function heightOf({ name, note }: Line): number {
	const rows = (text: string, signs: number) => Math.ceil(text.length / signs)
	return 15 + 15.5 * rows(name, NOTE_SIGNS - 8) + 13 * rows(note, NOTE_SIGNS)
}

/** Lines by page. The last page has room for the closing, and may hold nothing else. */
function pagesOf(lines: readonly Line[]): Line[][] {
	const pages: Line[][] = [[]]
	let left = ROOM.page - ROOM.head
	for (const line of lines) {
		const height = heightOf(line)
		if (height > left) {
			pages.push([])
			left = ROOM.page
		}
		pages.at(-1)?.push(line)
		left -= height
	}
	if (left < ROOM.closing) pages.push([])
	return pages
}

function Head({ statement: { yard, store, range } }: { statement: StatementProps }) {
	return (
		<>
			<View style={[paper.beside, { gap: 24 }]}>
				<Text style={[paper.yard, { flex: 1 }]}>{yard.name}</Text>
				<Text style={paper.number}>Statement</Text>
			</View>
			<View style={[paper.beside, paper.soft, { gap: 24, marginTop: 3, marginBottom: 10 }]}>
				<Text style={{ flex: 1 }}>{joinKnown([yard.address, yard.email, yard.phone], ". ")}</Text>
				<Text>{fullDay(range.until)}</Text>
			</View>
			<DoubleRule />
			<View style={{ paddingTop: 14, paddingBottom: 16 }}>
				<Text style={paper.group}>To</Text>
				<Text style={paper.whom}>{store.name}</Text>
				{store.address && <Text style={paper.text}>{store.address}</Text>}
				<Text style={[paper.text, paper.soft]}>
					{fullDay(range.from)} to {fullDay(range.until)}, in dollars
				</Text>
			</View>
		</>
	)
}

function Heads() {
	return (
		<View style={paper.heads}>
			<Text style={{ width: width.day }}>Day</Text>
			<Text style={{ flex: 1 }}>What</Text>
			<Text style={{ width: width.amount, textAlign: "right" }}>Amount</Text>
			<Text style={{ width: width.balance, textAlign: "right" }}>Balance</Text>
		</View>
	)
}

function BroughtForward({ statement: { range, broughtForwardCents } }: { statement: StatementProps }) {
	return (
		<View style={paper.line} wrap={false}>
			<Text style={[paper.text, { width: width.day }]}>{fullDay(range.from)}</Text>
			<Text style={[paper.note, { flex: 1 }]}>Brought forward</Text>
			<Text style={[paper.amount, { width: width.balance }]}>{plainMoney(broughtForwardCents)}</Text>
		</View>
	)
}

function Foot({ page, pages }: { page: number; pages: number }) {
	return (
		<View style={paper.foot}>
			<Text>Days late are counted from the due date.</Text>
			<Text>{pages > 1 ? `Page ${page} of ${pages}` : ""}</Text>
			<View style={{ flexDirection: "row", alignItems: "center", gap: 4 }}>
				<Mark />
				<Text>Waxbill</Text>
			</View>
		</View>
	)
}

function LineRow({ line }: { line: Line }) {
	const { on, name, note, amountCents, balanceCents } = line
	return (
		<View style={paper.line} wrap={false}>
			<Text style={[paper.text, { width: width.day }]}>{fullDay(on)}</Text>
			<View style={{ flex: 1, paddingRight: 8 }}>
				<Text style={paper.text}>{name}</Text>
				{note !== "" && <Text style={paper.small}>{note}</Text>}
			</View>
			<Text style={[paper.amount, { width: width.amount }]}>{plainMoney(amountCents)}</Text>
			<Text style={[paper.amount, { width: width.balance }]}>{plainMoney(balanceCents)}</Text>
		</View>
	)
}

/** What is owed over a double rule, and how long; never parted by the end of a page. */
function Closing({ statement: { closingCents, ageing, onAccountCents, range } }: { statement: StatementProps }) {
	return (
		<View wrap={false}>
			<View style={[paper.total, { paddingLeft: 0, marginTop: -0.75 }]}>
				<Text style={paper.totalWords}>{closingCents < 0 ? "In your favor" : "Owed"}</Text>
				<View>
					<Text style={[paper.totalWords, { marginBottom: 6 }]}>{formatMoney(Math.abs(closingCents))}</Text>
					<DoubleRule />
				</View>
			</View>
			<Text style={[paper.plain, { marginTop: 18 }]}>
				What was open on {fullDay(range.until)}, by days past the due date
				{onAccountCents > 0 ? `; ${formatMoney(onAccountCents)} on account is still to be set against it` : ""}.
			</Text>
			<View style={{ flexDirection: "row", gap: 10, marginTop: 6 }}>
				{ageing.map(({ label, cents }) => (
					<View key={label} style={{ flexGrow: 1, flexBasis: 0 }}>
						<Text style={paper.small}>{label}</Text>
						<Text style={paper.figure}>{plainMoney(cents)}</Text>
					</View>
				))}
			</View>
		</View>
	)
}
