import { type Day, dayWords } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { QuantityField } from "~/ui/forms/quantity-field"

type Open = { number: string; dueOn: Day; openCents: number; onItsWayCents: number }

const SHOWN = 100

/** Where a payment goes: the oldest invoice first, or so much to each as told. */
export function ToldParts({
	invoices,
	values,
	errors,
}: {
	invoices: readonly Open[]
	values: Record<string, string> | undefined
	errors: readonly { field?: string; message: string }[]
}) {
	const goes = values?.goes ?? "oldest"
	return (
		<fieldset className="told-parts">
			<legend className="field-label">It goes to</legend>
			<label className="flex items-center gap-3 py-1">
				<input
					type="radio"
					className="size-5 accent-clover"
					name="goes"
					value="oldest"
					defaultChecked={goes !== "told"}
				/>
				the invoice due first, then the next
			</label>
			<label className="flex items-center gap-3 py-1">
				<input
					type="radio"
					className="size-5 accent-clover"
					name="goes"
					value="told"
					defaultChecked={goes === "told"}
				/>
				as told here, and the rest to the store’s account
			</label>
			<ul>
				{invoices.slice(0, SHOWN).map((invoice) => (
					<li key={invoice.number}>
						<span>
							<span className="fig">{invoice.number}</span>, due {dayWords(invoice.dueOn)}:{" "}
							{formatMoney(invoice.openCents)}
							{invoice.onItsWayCents > 0 && (
								<span className="note block">{formatMoney(invoice.onItsWayCents)} on its way</span>
							)}
						</span>
						<QuantityField
							name={`told-${invoice.number}`}
							className="wide"
							label={`Of it to invoice ${invoice.number}`}
							defaultValue={values?.[`told-${invoice.number}`]}
							error={errors.find(({ field }) => field === `told-${invoice.number}`)?.message}
						/>
					</li>
				))}
			</ul>
		</fieldset>
	)
}
