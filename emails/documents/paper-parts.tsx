import { Document, Page, renderToBuffer, Text, View } from "@react-pdf/renderer"
import type { ReactElement, ReactNode } from "react"
import { type Day, fullDay } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { joinKnown } from "../words"
import { DoubleRule, Mark, NoteRule, TearLine } from "./drawings"
import { registerFonts } from "./fonts"
import { legible } from "./legible"
import { margin, paper } from "./paper"

const LETTER_WIDTH = 612

/**
 * Draws a document of the family from its props: `draw` gets them in letters that the typefaces hold. Throws when the
 * fonts of the packages cannot be read.
 */
export async function renderPaper<Props>(
	props: Props,
	draw: (props: Props) => ReactElement<React.ComponentProps<typeof Document>>,
): Promise<Buffer> {
	return renderToBuffer(draw(legible(props, registerFonts())))
}

interface PaperProps {
	/** "Invoice 2026-0012". */
	title: string
	/** Whose paper it is. */
	yard: { name: string; address: string; email: string; phone?: string | null }
	/** To whom and about what, for the file's own words. */
	subject: string
	/** The day on the paper, by which the file is dated too, so that the same document is the same file. */
	day: Day
	/** One line of small print at the foot of every page. */
	fine: string
	children: ReactNode
}

/**
 * A document on Letter paper: the yard and the title at its head, the small print with the number of the page at every
 * foot. The renderer writes text that can be selected, in reading order, with the language and the title of the file;
 * it has no means of tagging headings, tables and paragraphs, so a reader aloud is better served by the page.
 */
export function Paper({ title, yard, subject, day, fine, children }: PaperProps) {
	return (
		<Document
			title={title}
			author={yard.name}
			subject={subject}
			creator="Waxbill"
			producer="Waxbill"
			language="en-US"
			creationDate={new Date(`${day}T12:00:00Z`)}
		>
			<Page size="LETTER" style={paper.page}>
				<View style={[paper.beside, { gap: 24 }]}>
					<Text style={[paper.yard, { flex: 1 }]}>{yard.name}</Text>
					<Text style={paper.number}>{title}</Text>
				</View>
				<View style={[paper.beside, paper.soft, { gap: 24, marginTop: 3, marginBottom: 10 }]}>
					<Text style={{ flex: 1 }}>{joinKnown([yard.address, yard.email, yard.phone], ". ")}</Text>
					<Text>{fullDay(day)}</Text>
				</View>
				<DoubleRule />
				{children}
				<View style={paper.foot} fixed>
					<Text>{fine}</Text>
					<Text
						render={({ pageNumber, totalPages }) => (totalPages > 1 ? `Page ${pageNumber} of ${totalPages}` : "")}
					/>
					<View style={{ flexDirection: "row", alignItems: "center", gap: 4 }}>
						<Mark />
						<Text>Waxbill</Text>
					</View>
				</View>
			</Page>
		</Document>
	)
}

interface Party {
	group: string
	name: string
	facts: readonly (string | null | undefined)[]
}

/** To whom, what was delivered, by when to pay: groups of facts beside one another. */
export function Parties({ parties }: { parties: readonly Party[] }) {
	return (
		<View style={{ flexDirection: "row", gap: 14, paddingTop: 14, paddingBottom: 16 }}>
			{parties.map(({ group, name, facts }) => (
				<View key={group} style={{ flexGrow: 1, flexBasis: 0 }}>
					<Text style={paper.group}>{group}</Text>
					<Text style={paper.whom}>{name}</Text>
					{facts
						.filter((fact) => fact)
						.map((fact) => (
							<Text key={fact} style={paper.text}>
								{fact}
							</Text>
						))}
				</View>
			))}
		</View>
	)
}

interface SumsProps {
	charges: readonly { label: string; cents: number }[]
	total: { label: string; cents: number }
}

/** Sums below the lines, then what is left over a double rule; never parted by the end of a page. */
export function Sums({ charges, total }: SumsProps) {
	return (
		<View wrap={false}>
			{charges.map((charge) => (
				<Sum key={charge.label} {...charge} />
			))}
			<View style={paper.total}>
				<Text style={paper.totalWords}>{total.label}</Text>
				<View>
					<Text style={[paper.totalWords, { marginBottom: 6 }]}>{formatMoney(total.cents)}</Text>
					<DoubleRule />
				</View>
			</View>
		</View>
	)
}

/** One amount with its words. */
export function Sum({ label, cents }: { label: string; cents: number }) {
	return (
		<View style={paper.charge}>
			<Text style={[paper.text, { flex: 1 }]}>{label}</Text>
			<Text style={paper.amount}>{plainMoney(cents)}</Text>
		</View>
	)
}

/** Reasons in the margin's hand, and beside them what is said plainly. */
export function Notes({ reasons, plain }: { reasons: readonly string[]; plain: readonly string[] }) {
	return (
		<View style={{ flexDirection: "row", gap: 25, marginTop: 20 }}>
			{reasons.length > 0 && (
				<View style={{ flexGrow: 1.25, flexBasis: 0, flexDirection: "row" }}>
					<NoteRule />
					<Paragraphs style={paper.note} texts={reasons} />
				</View>
			)}
			<View style={{ flexGrow: 1, flexBasis: 0, flexDirection: "row" }}>
				<Paragraphs style={paper.plain} texts={plain} />
			</View>
		</View>
	)
}

function Paragraphs({ texts, style }: { texts: readonly string[]; style: (typeof paper)[keyof typeof paper] }) {
	return (
		<View style={{ flex: 1 }}>
			{texts.map((text, index) => (
				<Text key={text} style={[style, { marginTop: index === 0 ? 0 : 5 }]}>
					{text}
				</Text>
			))}
		</View>
	)
}

/** What goes back by itself. It takes the foot of the last page, or of one more page where there is no room. */
export function Slip({
	facts,
	words,
}: {
	facts: readonly { head: string; value: string; grow?: number }[]
	words: string
}) {
	return (
		<View wrap={false} style={{ marginTop: "auto", paddingTop: 20 }}>
			<TearLine width={LETTER_WIDTH - 2 * margin.side} />
			<View style={paper.slip}>
				{facts.map(({ head, value, grow = 1 }) => (
					<View key={head} style={{ flexGrow: grow, flexBasis: 0 }}>
						<Text style={paper.small}>{head}</Text>
						<Text style={paper.whom}>{value}</Text>
					</View>
				))}
				<Text style={[paper.small, { width: 78 }]}>{words}</Text>
			</View>
		</View>
	)
}
