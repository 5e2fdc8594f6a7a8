import { Link } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { listDay } from "~/ui/orders/state-words"
import { photoWords, reportWords } from "./breakage-words"

type Row = {
	id: string
	state: "open" | "accepted" | "part-accepted" | "declined"
	storeName: string
	invoiceNumber: string
	reportedOn: Day
	pieces: number
	acceptedPieces: number
	photos: number
	firstName: string
	moreLines: number
	creditNumber: string | null
	creditCents: number | null
}

/** Reports of broken comb with how each stands, in words. `showStore` where they are of several stores. */
export function ReportTable(table: { reports: readonly Row[]; today: Day; base: string; showStore?: boolean }) {
	const { reports, today, base, showStore = false } = table
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Reported</th>
					{showStore && <th scope="col">Store</th>}
					<th scope="col">What</th>
					<th scope="col" className="max-desk:hidden">
						Invoice
					</th>
					<th scope="col" className="max-desk:hidden">
						How it stands
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Credit
					</th>
				</tr>
			</thead>
			<tbody>
				{reports.map((report) => (
					<tr key={report.id} className={report.state === "open" ? undefined : "text-ink-soft"}>
						<td>
							<Link className="inline-block py-1 whitespace-nowrap" to={`${base}/breakage/${report.id}`}>
								<span title={fullDay(report.reportedOn)}>{listDay(report.reportedOn, today)}</span>
							</Link>
						</td>
						{showStore && <td>{report.storeName}</td>}
						<td>
							{piecesWords(report.pieces)}, {photoWords(report.photos)}
							<span className="note block">
								{report.firstName}
								{report.moreLines > 0 && ` and ${report.moreLines} more`}
							</span>
							<span className="note block desk:hidden">
								<Standing report={report} />
							</span>
						</td>
						<td className="max-desk:hidden">
							<Link className="inline-block py-1 fig" to={`${base}/invoices/${report.invoiceNumber}`}>
								{report.invoiceNumber}
							</Link>
						</td>
						<td className="max-desk:hidden">
							<Standing report={report} />
						</td>
						<td className="money pr-4! desk:pr-8!">
							{report.creditNumber && (
								<Link className="inline-block py-1" to={`${base}/credits/${report.creditNumber}`}>
									{formatMoney(report.creditCents ?? 0)}
								</Link>
							)}
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

function Standing({ report }: { report: Row }) {
	return <span className={report.state === "open" ? "short" : undefined}>{reportWords(report)}</span>
}
