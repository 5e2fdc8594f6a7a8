import { Document, Page, renderToBuffer, Text, View } from "@react-pdf/renderer"
import { type Day, fullDay } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"
import { weightWords } from "~/domain/weight"
import { joinKnown, NOT_FOR_INFANTS } from "../words"
import { DoubleRule, Mark } from "./drawings"
import { registerFonts } from "./fonts"
import { legible } from "./legible"
import { column, paper } from "./paper"

/** What a printed price list says. Money is cents for a case; a break stands beside its least number of cases. */
type PriceListProps = {
	yard: { name: string; address: string; email: string; phone: string }
	forName: string
	day: Day
	products: readonly {
		code: string
		name: string
		detail: string
		pieceNetGrams: number
		piecesPerCase: number
		breaks: readonly { minCases: number; caseCents: number }[]
		poundCents: readonly number[] | null
	}[]
}

const width = { case: 120, price: 150 }

/** Draws a price list on Letter paper, the heads of the columns on every page. Its date is the day it holds for. */
export async function renderPriceListPdf(list: PriceListProps): Promise<Buffer> {
	const writable = registerFonts()
	return renderToBuffer(<PriceListDocument list={legible(list, writable)} />)
}

function PriceListDocument({ list }: { list: PriceListProps }) {
	const { yard, forName, day, products } = list
	return (
		<Document
			title={`Prices for ${forName}`}
			author={yard.name}
			subject={`Prices on ${fullDay(day)}`}
			creator="Waxbill"
			producer="Waxbill"
			language="en-US"
			creationDate={new Date(`${day}T12:00:00Z`)}
		>
			<Page size="LETTER" style={paper.page}>
				<View style={[paper.beside, { gap: 24 }]}>
					<Text style={[paper.yard, { flex: 1 }]}>{yard.name}</Text>
					<Text style={paper.number}>Prices</Text>
				</View>
				<View style={[paper.beside, paper.soft, { gap: 24, marginTop: 3, marginBottom: 10 }]}>
					<Text style={{ flex: 1 }}>{joinKnown([yard.address, yard.email, yard.phone], ". ")}</Text>
					<Text>{fullDay(day)}</Text>
				</View>
				<DoubleRule />
				<Text style={[paper.whom, { marginTop: 14, marginBottom: 12 }]}>For {forName}</Text>
				<View style={paper.heads} fixed>
					<Text style={{ width: column.number }}>No.</Text>
					<Text style={{ flex: 1 }}>Product</Text>
					<Text style={{ width: width.case }}>A case holds</Text>
					<Text style={{ width: width.price, textAlign: "right" }}>A case, in dollars</Text>
				</View>
				{products.map((product) => (
					<ProductRow key={product.code} product={product} />
				))}
				<Text style={[paper.plain, { marginTop: 16 }]}>
					All cases of a family in one order are counted for its lower prices. {NOT_FOR_INFANTS}
				</Text>
				<View style={paper.foot} fixed>
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

function ProductRow({ product }: { product: PriceListProps["products"][number] }) {
	const { code, name, detail, pieceNetGrams, piecesPerCase, breaks, poundCents } = product
	return (
		<View style={paper.line} wrap={false}>
			<Text style={[paper.figure, paper.soft, { width: column.number }]}>{code}</Text>
			<View style={{ flex: 1, paddingRight: 8 }}>
				<Text style={paper.name}>{name}</Text>
				{detail !== "" && <Text style={paper.small}>{detail}</Text>}
			</View>
			<View style={{ width: width.case }}>
				<Text style={paper.figure}>{piecesPerCase} pieces</Text>
				<Text style={paper.small}>{weightWords(pieceNetGrams * piecesPerCase)} net</Text>
			</View>
			<View style={{ width: width.price }}>
				{breaks.map(({ minCases, caseCents }, index) => (
					<Text key={minCases} style={index === 0 ? paper.amount : [paper.amount, paper.soft]}>
						{index > 0 ? `from ${minCases}: ` : ""}
						{poundCents?.[index] === undefined
							? plainMoney(caseCents)
							: `${plainMoney(poundCents[index])} a lb, about ${plainMoney(caseCents)}`}
					</Text>
				))}
			</View>
		</View>
	)
}
