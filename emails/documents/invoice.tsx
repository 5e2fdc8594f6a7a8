import { Document, Page, renderToBuffer, Text, View } from "@react-pdf/renderer"
import type { ReactNode } from "react"
import { dayWords, fullDay, monthDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { casesWords } from "~/domain/quantity"
import { joinKnown, KEEP_COMB, NOT_FOR_INFANTS, shortSentences } from "../words"
import { DoubleRule, Mark, NoteRule, TearLine } from "./drawings"
import { registerFonts } from "./fonts"
import { InvoiceLines, InvoiceSums } from "./invoice-lines"
import { type InvoiceProps, openCents, sentLines } from "./invoice-props"
import { legible } from "./legible"
import { margin, paper } from "./paper"

const LETTER_WIDTH = 612

/**
 * Draws the printed page of an invoice: Letter, a tear-off slip at the foot of the last page while something is to be
 * paid, column heads on every page. The date of the file is the day of issue, so the same invoice gives the same page.
 * Throws when the fonts of the packages cannot be read.
 */
export async function renderInvoicePdf(invoice: InvoiceProps): Promise<Buffer> {
	const writable = registerFonts()
	return renderToBuffer(<InvoiceDocument invoice={legible(invoice, writable)} />)
}

function InvoiceDocument({ invoice }: { invoice: InvoiceProps }) {
	const { yard, number, issuedOn, lines } = invoice
	return (
		<Document
			title={`Invoice ${number}`}
			author={yard.name}
			subject={`Invoice ${number} to ${invoice.store.name}, ${fullDay(issuedOn)}`}
			creator="Waxbill"
			producer="Waxbill"
			language="en-US"
			creationDate={new Date(`${issuedOn}T12:00:00Z`)}
		>
			<Page size="LETTER" style={paper.page}>
				<InvoiceHead invoice={invoice} />
				<Parties invoice={invoice} />
				<InvoiceLines lines={lines} />
				<InvoiceSums {...invoice} />
				<Notes invoice={invoice} />
				{openCents(invoice) > 0 && <Slip invoice={invoice} />}
				<Foot />
			</Page>
		</Document>
	)
}

function InvoiceHead({ invoice: { yard, number, issuedOn } }: { invoice: InvoiceProps }) {
	return (
		<View>
			<View style={[paper.beside, { gap: 24 }]}>
				<Text style={[paper.yard, { flex: 1 }]}>{yard.name}</Text>
				<Text style={paper.number}>Invoice {number}</Text>
			</View>
			<View style={[paper.beside, paper.soft, { gap: 24, marginTop: 3, marginBottom: 10 }]}>
				<Text style={{ flex: 1 }}>{joinKnown([yard.address, yard.email, yard.phone], ". ")}</Text>
				<Text>{fullDay(issuedOn)}</Text>
			</View>
			<DoubleRule />
		</View>
	)
}

function Parties({ invoice }: { invoice: InvoiceProps }) {
	const { store, order, delivered, due, lines, number, waysToPay } = invoice
	const sent = lines.reduce((sum, line) => sum + line.casesSent, 0)
	return (
		<View style={{ flexDirection: "row", gap: 14, paddingTop: 14, paddingBottom: 16 }}>
			<Party
				group="To"
				name={store.name}
				facts={[store.contactName, store.address, `Your order of ${monthDay(order.placedOn)}`]}
			/>
			<Party
				group="Delivered"
				name={dayWords(delivered.on)}
				facts={[
					joinKnown([delivered.at, delivered.place, casesWords(sent)]),
					delivered.netWeight && `${delivered.netWeight} of comb, net`,
					delivered.signedBy && `Signed for by ${delivered.signedBy}`,
				]}
			/>
			{openCents(invoice) > 0 ? (
				<Party group="Please pay by" name={dayWords(due.on)} facts={[due.termsWords, waysToPay, `Quote ${number}`]} />
			) : (
				<Party group="To pay" name="Nothing" facts={["This invoice is paid."]} />
			)}
		</View>
	)
}

interface PartyProps {
	group: string
	name: string
	facts: readonly (string | null | undefined)[]
}

function Party({ group, name, facts }: PartyProps) {
	return (
		<View style={{ flexGrow: 1, flexBasis: 0 }}>
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
	)
}

function Notes({ invoice }: { invoice: InvoiceProps }) {
	const sentences = shortSentences(sentLines(invoice))
	const plain = [`${KEEP_COMB} ${NOT_FOR_INFANTS}`, ...invoice.notes]
	return (
		<View style={{ flexDirection: "row", gap: 25, marginTop: 20 }}>
			{sentences.length > 0 && (
				<View style={{ flexGrow: 1.25, flexBasis: 0, flexDirection: "row" }}>
					<NoteRule />
					<Paragraphs style={paper.note} texts={sentences} />
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

/** What goes back with a check. It takes the foot of the last page, or of one more page where there is no room. */
function Slip({ invoice }: { invoice: InvoiceProps }) {
	const { number, store, due } = invoice
	return (
		<View wrap={false} style={{ marginTop: "auto", paddingTop: 20 }}>
			<TearLine width={LETTER_WIDTH - 2 * margin.side} />
			<View style={paper.slip}>
				<SlipFact head="Invoice">{number}</SlipFact>
				<SlipFact head="Store" grow={1.8}>
					{store.name}
				</SlipFact>
				<SlipFact head={`By ${monthDay(due.on)}`}>{formatMoney(openCents(invoice))}</SlipFact>
				<Text style={[paper.small, { width: 78 }]}>Tear here and send with a check.</Text>
			</View>
		</View>
	)
}

function SlipFact({ head, grow = 1, children }: { head: string; grow?: number; children: ReactNode }) {
	return (
		<View style={{ flexGrow: grow, flexBasis: 0 }}>
			<Text style={paper.small}>{head}</Text>
			<Text style={paper.whom}>{children}</Text>
		</View>
	)
}

function Foot() {
	return (
		<View style={paper.foot} fixed>
			<Text>One solid cell is one case sent; a bare line is one asked for and not sent.</Text>
			<Text render={({ pageNumber, totalPages }) => (totalPages > 1 ? `Page ${pageNumber} of ${totalPages}` : "")} />
			<View style={{ flexDirection: "row", alignItems: "center", gap: 4 }}>
				<Mark />
				<Text>Waxbill</Text>
			</View>
		</View>
	)
}
