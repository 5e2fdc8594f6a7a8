import { data, Form } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { HONEY_ON_TRACEABILITY_LIST, needsRecipientRecord } from "~/domain/trace/record-fields"
import { AT_HAND_WITHIN_HOURS, HONEY_KEEP_MONTHS } from "~/domain/trace/retention"
import { now } from "~/platform/clock.server"
import { findMoneyShare } from "~/services/trace/find-money-share.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SelectField, TextField } from "~/ui/forms/fields"
import { MarginNote, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/records"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { recordsRange } from "./records-range"

export const meta: Route.MetaFunction = () => [{ title: "Records for an inspector · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const today = dayInZone(now(), producer.timeZone)
	const range = recordsRange(url, today)
	const answer = {
		frame: await findDeskFrame(scope, { part: "lots" }),
		...range,
		share: await findMoneyShare({ producer, year: Number(today.slice(0, 4)) }),
	}
	return data(answer, { status: range.error ? 400 : 200 })
})

/** Days for the file, how long records are kept, and how the year's money divides. */
export default function Records({ loaderData, params }: Route.ComponentProps) {
	const { from, to, error, share } = loaderData
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead
				title="Records for an inspector"
				lead="One step back and one step forward for every lot, as a file that a spreadsheet opens."
				note={`An inspector may ask for them within ${AT_HAND_WITHIN_HOURS} hours. Source: 21 CFR 1.361, from memory.`}
			/>
			<ErrorSummary errors={error ? [{ field: "from", message: error }] : []} />
			{/* A file, not a page: the browser takes it. */}
			<Form method="get" action={`/desk/${params.producer}/records.csv`} reloadDocument className="sheet-form in-line">
				<SelectField
					name="of"
					label="What"
					options={[
						{ value: "released", label: "what left for stores" },
						{ value: "received", label: "what came off the hives" },
					]}
				/>
				<TextField name="from" label="From day" type="date" defaultValue={from} error={error ?? undefined} />
				<TextField name="to" label="To day" type="date" defaultValue={to} />
				<div>
					<Button variant="primary">Download the file</Button>
				</div>
			</Form>
			<section className="sheet-part" aria-labelledby="records-hold">
				<h2 className="head-italic" id="records-hold">
					What it holds
				</h2>
				<p>
					For what left: the store with its address, telephone and e-mail, the food with its variety, the day, the lot,
					how many pieces in which cases, who carried it, and the lots and yards it was made from. Source: 21 CFR 1.345.
					For what came in: the same of the source. Source: 21 CFR 1.337. Days are delivery days for the one and harvest
					days for the other.
				</p>
				<p>
					{!needsRecipientRecord("consumer") && "What people buy at the stall to eat needs no name in the record. "}
					{!HONEY_ON_TRACEABILITY_LIST && "Honey is not on the list of foods that need further records. "}
					What is missing in a store’s row is missing on the store’s page.
				</p>
			</section>
			<section className="sheet-part" aria-labelledby="records-kept">
				<h2 className="head-italic" id="records-kept">
					How long they are kept
				</h2>
				<p>
					Food that keeps its value for more than six months, as comb honey does: {HONEY_KEEP_MONTHS} months. Nothing of
					these records is cleared away before that. Source: 21 CFR 1.360, from memory; 21 U.S.C. 350c(b) allows no
					longer duty.
				</p>
			</section>
			<section className="sheet-part" aria-labelledby="records-share">
				<h2 className="head-italic" id="records-share">
					Sales of {share.year} to the public and to stores
				</h2>
				<p>
					<b>{formatMoney(share.consumerCents)}</b> to the public and <b>{formatMoney(share.otherCents)}</b> to stores,
					as far as they are written here.{" "}
					{share.isRetail
						? "More to the public than to all others: a year like this is that of a retail food establishment."
						: "Not more to the public than to all others: a year like this is not that of a retail food establishment."}
				</p>
				<p>
					A retail food establishment, like a farm, need not register as a food facility. Source: 21 CFR 1.226 and
					1.227.
				</p>
			</section>
			<div className="sheet-part">
				<MarginNote>Local rules decide, and this is no legal advice. Ask your authority.</MarginNote>
			</div>
		</DeskBook>
	)
}
